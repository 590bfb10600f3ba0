import {
  airBroadcast,
  CORPUS_RATE_HZ,
  filterSamples,
  levelled,
  mixed,
  noise,
  shuffled,
  type Broadcast,
  type Item,
  type Random,
  type Samples,
} from '../corpus/index.ts'
import type { LoadedTrack } from './catalogue.ts'

/** One way in which music reaches a log. */
export type Condition = {
  readonly name: string
  readonly build: () => Promise<Broadcast>
  /** How the whole log is coded before it is analysed; none means it is left as it is. */
  readonly bitRate?: string
}

type Studio = {
  readonly catalogue: readonly LoadedTrack[]
  readonly unknown: readonly LoadedTrack[]
  readonly speech: (seconds: number) => Samples
  readonly random: Random
}

const WHOLE_SECONDS = 75
const PLAYS = 16
const SPEED_PLAYS = 8
const EXCERPTS = 24
const LOWEST_EXCERPT_LOUDNESS = 0.3

function samplesOf(seconds: number): number {
  return Math.round(seconds * CORPUS_RATE_HZ)
}

function opening({ samples }: LoadedTrack, seconds: number): Samples {
  return levelled(samples.slice(0, samplesOf(seconds)))
}

/** A stretch from somewhere in the piece that is not a pause or a fade. */
function excerpt({ track, samples }: LoadedTrack, seconds: number, random: Random): Item {
  const whole = levelled(samples)
  const length = Math.min(whole.length, samplesOf(seconds))
  let first = 0
  for (let attempt = 0; attempt < 30; attempt++) {
    first = Math.floor(random() * (whole.length - length + 1))
    const part = whole.subarray(first, first + length)
    const power = part.reduce((sum, sample) => sum + sample * sample, 0) / length
    if (Math.sqrt(power) > LOWEST_EXCERPT_LOUDNESS * 0.1) break
  }
  return {
    samples: levelled(whole.slice(first, first + length)),
    track: track.path,
    refStart: first / CORPUS_RATE_HZ,
  }
}

function withSpeechBetween(items: readonly Item[], { speech }: Studio, seconds: number): Item[] {
  return items.flatMap((item) => [{ samples: speech(seconds) }, item])
}

function chosen({ catalogue, random }: Studio, count: number): LoadedTrack[] {
  return shuffled(catalogue, random).slice(0, count)
}

function wholePlays(studio: Studio): Item[] {
  return chosen(studio, PLAYS).map((loaded) => ({
    samples: opening(loaded, WHOLE_SECONDS),
    track: loaded.track.path,
  }))
}

/** Speech over the first and last eight seconds, music 9 dB down, as a presenter does. */
function talkedOver(item: Item, { speech }: Studio): Item {
  const length = samplesOf(8)
  const samples = item.samples.slice()
  for (const from of [0, samples.length - length]) {
    const part = samples.slice(from, from + length).map((sample) => sample * 0.35)
    samples.set(mixed(part, speech(8)), from)
  }
  return { ...item, samples }
}

/** Pink-ish noise: white noise through a falling filter. */
async function broadcastNoise(length: number, random: Random): Promise<Samples> {
  return levelled(await filterSamples(noise(length, random), 'lowpass=f=500:poles=1,lowpass=f=3000:poles=1'))
}

async function atSpeed(studio: Studio, percent: number, isTempo: boolean): Promise<Broadcast> {
  const speed = 1 + percent / 100
  const rate = Math.round(CORPUS_RATE_HZ * speed)
  const filter = isTempo ? `atempo=${speed}` : `asetrate=${rate},aresample=${CORPUS_RATE_HZ}`
  const items: Item[] = []
  for (const loaded of chosen(studio, SPEED_PLAYS)) {
    const samples = await filterSamples(opening(loaded, 60), filter)
    items.push({ samples, track: loaded.track.path, speed: isTempo ? speed : rate / CORPUS_RATE_HZ })
  }
  return airBroadcast(withSpeechBetween(items, studio, 6))
}

function excerptsInSpeech(studio: Studio, seconds: number): Broadcast {
  const items = chosen(studio, EXCERPTS).map((loaded) => excerpt(loaded, seconds, studio.random))
  return airBroadcast(withSpeechBetween(items, studio, 8))
}

function underSpeech(studio: Studio): Broadcast {
  const items = chosen(studio, EXCERPTS).map((loaded, n) => {
    const item = excerpt(loaded, n % 2 === 0 ? 12 : 25, studio.random)
    const speech = studio.speech(item.samples.length / CORPUS_RATE_HZ + 1)
    return { ...item, samples: mixed(speech.subarray(0, item.samples.length), item.samples, -12) }
  })
  return airBroadcast(withSpeechBetween(items, studio, 12))
}

async function inNoise(studio: Studio, seconds: number, ratioDb: number): Promise<Broadcast> {
  const items = chosen(studio, EXCERPTS).flatMap((loaded) => [
    { samples: new Float32Array(samplesOf(8)) },
    excerpt(loaded, seconds, studio.random),
  ])
  const broadcast = airBroadcast(items)
  const added = await broadcastNoise(broadcast.samples.length, studio.random)
  return { ...broadcast, samples: mixed(broadcast.samples, added, -ratioDb) }
}

const PROCESSING =
  'acompressor=threshold=0.03:ratio=8:attack=5:release=80:makeup=4,equalizer=f=150:t=q:w=1:g=6,equalizer=f=3000:t=q:w=1:g=5,alimiter=limit=0.5'
const AM_BAND = 'highpass=f=150,lowpass=f=3500'

function wholeConditions(studio: Studio): Condition[] {
  const clean = (): Broadcast => airBroadcast(withSpeechBetween(wholePlays(studio), studio, 6))
  const filtered = async (filters: string): Promise<Broadcast> => {
    const broadcast = clean()
    return { ...broadcast, samples: await filterSamples(broadcast.samples, filters) }
  }
  return [
    { name: 'clean', bitRate: '64k', build: async () => clean() },
    {
      name: 'talk-over',
      bitRate: '64k',
      build: async () =>
        airBroadcast(
          withSpeechBetween(
            wholePlays(studio).map((item) => talkedOver(item, studio)),
            studio,
            6,
          ),
        ),
    },
    { name: 'processed', bitRate: '48k', build: () => filtered(PROCESSING) },
    {
      name: '32 kbit/s AM band with noise',
      bitRate: '32k',
      build: async () => {
        const broadcast = await filtered(AM_BAND)
        return {
          ...broadcast,
          samples: mixed(broadcast.samples, noise(broadcast.samples.length, studio.random), -34),
        }
      },
    },
  ]
}

/** Every condition of the table, and an hour and more of music the catalogue does not hold. */
export function listConditions(studio: Studio): Condition[] {
  const speeds = [1.5, -1.5, 3, -3, 4, -4].map((percent): Condition => ({
    name: `speed ${percent > 0 ? '+' : ''}${percent} %`,
    build: () => atSpeed(studio, percent, false),
  }))
  const tempi = [4, -4].map((percent): Condition => ({
    name: `tempo ${percent > 0 ? '+' : ''}${percent} %`,
    build: () => atSpeed(studio, percent, true),
  }))
  return [
    ...wholeConditions(studio),
    ...speeds,
    ...tempi,
    { name: '5 s in speech', bitRate: '64k', build: async () => excerptsInSpeech(studio, 5) },
    { name: '10 s in speech', bitRate: '64k', build: async () => excerptsInSpeech(studio, 10) },
    { name: '12 dB under speech', build: async () => underSpeech(studio) },
    { name: '15 s in noise at -9 dB', build: () => inNoise(studio, 15, -9) },
    { name: '10 s in noise at -6 dB', build: () => inNoise(studio, 10, -6) },
    { name: '5 s in noise at -3 dB', build: () => inNoise(studio, 5, -3) },
    {
      name: 'unknown music',
      bitRate: '64k',
      build: async () => airBroadcast(studio.unknown.map(({ samples }) => ({ samples: levelled(samples) }))),
    },
  ]
}
