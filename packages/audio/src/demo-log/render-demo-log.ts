import { openAudioWriter, type EncodingOptions } from '../encode/audio-writer.ts'
import { resample } from '../resample/resampler.ts'
import { bendPeak } from '../synthesis/bend-peak.ts'

/** Samples at the plan's rate, or a function that makes them when their turn comes, so that memory stays bounded. */
export type DemoSamples = Float32Array | (() => Float32Array | Promise<Float32Array>)

type Common = {
  /**
   * Seconds by which this item starts before everything earlier has ended; default 0. Two tunes that overlap are
   * crossfaded; where speech and a tune overlap, the tune is turned down.
   */
  readonly overlapSeconds?: number
  readonly gain?: number
}

/** A piece of a generated log. */
export type DemoLogItem =
  | (Common & {
      readonly kind: 'tune'
      /** Comes back in the truth. */
      readonly label: string
      readonly samples: DemoSamples
      readonly fromSeconds?: number
      readonly toSeconds?: number
      /** Pitch and tempo together, as when a player runs fast; default 1. */
      readonly speed?: number
    })
  | (Common & { readonly kind: 'speech'; readonly samples: DemoSamples })
  | { readonly kind: 'silence'; readonly seconds: number }

export type DemoLogPlan = { readonly sampleRateHz: number; readonly items: readonly DemoLogItem[] }

/** Where a tune really is in a generated log, fades included. */
export type DemoLogPlay = {
  readonly label: string
  readonly startSeconds: number
  readonly endSeconds: number
  /** Position in the tune that is heard at `startSeconds`. */
  readonly referenceStartSeconds: number
  readonly speed: number
}

export type DemoLogTruth = { readonly durationSeconds: number; readonly plays: readonly DemoLogPlay[] }

/** A tune under speech is this much quieter (−12 dB). */
const DUCKED_GAIN = 0.25
const DUCK_RAMP_SECONDS = 0.25
/** A cut is softened by this much, so that it does not click. */
const SHORTEST_FADE_SECONDS = 0.005
const BLOCK_SAMPLES = 32_768
const SPEED_STEPS = 10_000

type Placed = {
  readonly kind: 'tune' | 'speech'
  readonly samples: Float32Array
  readonly start: number
  readonly end: number
  readonly gain: number
  readonly fadeIn: number
  readonly fadeOut: number
}

function overlapOf(item: DemoLogItem | undefined): number {
  return item && item.kind !== 'silence' ? (item.overlapSeconds ?? 0) : 0
}

async function loadSamples(item: Exclude<DemoLogItem, { kind: 'silence' }>, sampleRateHz: number) {
  const all = typeof item.samples === 'function' ? await item.samples() : item.samples
  if (item.kind === 'speech') return all
  const part = all.subarray(
    Math.round((item.fromSeconds ?? 0) * sampleRateHz),
    item.toSeconds === undefined ? all.length : Math.round(item.toSeconds * sampleRateHz),
  )
  const speed = item.speed ?? 1
  return speed === 1 ? part : resample(part, Math.round(speed * SPEED_STEPS), SPEED_STEPS)
}

function mixItem(block: Float32Array, blockStart: number, item: Placed, duck: Float32Array): void {
  const from = Math.max(blockStart, item.start)
  const to = Math.min(blockStart + block.length, item.end)
  for (let position = from; position < to; position++) {
    const rise = Math.min(1, (position - item.start + 1) / item.fadeIn)
    const fall = Math.min(1, (item.end - position) / item.fadeOut)
    // Sine-shaped fades keep the power of a crossfade even.
    const fade = rise < 1 || fall < 1 ? Math.sin((Math.PI / 2) * rise) * Math.sin((Math.PI / 2) * fall) : 1
    const at = position - blockStart
    const level = item.gain * fade * (item.kind === 'tune' ? (duck[at] ?? 1) : 1)
    block[at] = (block[at] ?? 0) + level * (item.samples[position - item.start] ?? 0)
  }
}

/** How far tunes are turned down at each sample of a block, moving gently towards where speech wants it. */
function createDucker(sampleRateHz: number) {
  const step = (1 - DUCKED_GAIN) / (DUCK_RAMP_SECONDS * sampleRateHz)
  let level = 1
  return (length: number, blockStart: number, items: readonly Placed[]): Float32Array => {
    const speech = items.filter((item) => item.kind === 'speech')
    return Float32Array.from({ length }, (_, i) => {
      const position = blockStart + i
      const isSpoken = speech.some((item) => position >= item.start && position < item.end)
      level = isSpoken ? Math.max(DUCKED_GAIN, level - step) : Math.min(1, level + step)
      return level
    })
  }
}

/** Lays items on a time line and gives out what is complete. */
function createMixer(sampleRateHz: number) {
  const duck = createDucker(sampleRateHz)
  let items: Placed[] = []
  let position = 0
  return {
    add: (item: Placed) => {
      if (item.start < position) throw new RangeError('an item may not start before the one before it')
      items.push(item)
    },
    *takeUntil(end: number): Generator<Float32Array, void, undefined> {
      while (position < end) {
        const block = new Float32Array(Math.min(BLOCK_SAMPLES, end - position))
        const levels = duck(block.length, position, items)
        for (const item of items) mixItem(block, position, item, levels)
        for (let i = 0; i < block.length; i++) block[i] = bendPeak(block[i] ?? 0)
        position += block.length
        items = items.filter((item) => item.end > position)
        yield block
      }
    },
  }
}

async function* mixLog({ items, sampleRateHz }: DemoLogPlan, plays: DemoLogPlay[]) {
  const mixer = createMixer(sampleRateHz)
  let cursor = 0
  for (const [index, item] of items.entries()) {
    const next = items[index + 1]
    if (item.kind === 'silence') {
      cursor += Math.round(item.seconds * sampleRateHz)
    } else {
      const samples = await loadSamples(item, sampleRateHz)
      const start = Math.max(0, cursor - Math.round(overlapOf(item) * sampleRateHz))
      const end = start + samples.length
      const fade = (overlapping: boolean, seconds: number) =>
        Math.max(1, Math.round(sampleRateHz * Math.max(SHORTEST_FADE_SECONDS, overlapping ? seconds : 0)))
      const isTune = item.kind === 'tune'
      mixer.add({
        kind: item.kind,
        samples,
        start,
        end,
        gain: item.gain ?? 1,
        fadeIn: fade(isTune && items[index - 1]?.kind === 'tune', overlapOf(item)),
        fadeOut: fade(isTune && next?.kind === 'tune', overlapOf(next)),
      })
      if (isTune) {
        plays.push({
          label: item.label,
          startSeconds: start / sampleRateHz,
          endSeconds: end / sampleRateHz,
          referenceStartSeconds: item.fromSeconds ?? 0,
          speed: item.speed ?? 1,
        })
      }
      cursor = Math.max(cursor, end)
    }
    yield* mixer.takeUntil(Math.max(0, cursor - Math.round(overlapOf(next) * sampleRateHz)))
  }
  yield* mixer.takeUntil(cursor)
}

/**
 * Builds a station's log out of tunes, speech and silence, straight into a file: memory holds only the items that are
 * sounding. Returns where each tune really is.
 * @throws AudioError when the file cannot be written; RangeError when an item starts before the one before it.
 */
export async function renderDemoLog(
  path: string,
  plan: DemoLogPlan,
  encoding: EncodingOptions,
): Promise<DemoLogTruth> {
  const plays: DemoLogPlay[] = []
  const writer = await openAudioWriter(path, plan.sampleRateHz, encoding)
  let samples = 0
  try {
    for await (const block of mixLog(plan, plays)) {
      samples += block.length
      await writer.write(block)
    }
    await writer.finish()
  } catch (error) {
    await writer.discard()
    throw error
  }
  return { durationSeconds: samples / plan.sampleRateHz, plays }
}
