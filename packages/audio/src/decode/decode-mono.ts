import { AudioError, noSamples, undecodable } from '../audio-error.ts'
import type { AudioFormat } from '../formats/audio-format.ts'
import { openByteSource, type ByteSource } from '../formats/bytes.ts'
import { inspectAudio, type Inspection } from '../inspect.ts'
import { createResampler, type Resampler } from '../resample/resampler.ts'
import { decodeWithFfmpeg, findFfmpeg, type FfmpegOutcome } from './ffmpeg-decoder.ts'
import { canStreamWithPackage, decodeWithPackage } from './packaged-decoder.ts'
import type { PcmBlock } from './pcm-source.ts'

export type DecodeOptions = {
  /** Rate of the samples wanted, any positive integer. */
  readonly sampleRateHz: number
  readonly signal?: AbortSignal
  /** Longer recordings are refused with `too-long`; default seven days. */
  readonly maximumDurationMs?: number
  /** Normally left out: ffmpeg where it is installed, else the package, which cannot read M4A, AAC and MP2. */
  readonly decoder?: 'audio-decode' | 'ffmpeg'
}

/** What is known once a recording was read to its end. */
export type DecodeSummary = {
  readonly format: AudioFormat
  readonly decoder: 'audio-decode' | 'ffmpeg'
  /** Samples given out, at the rate asked for. */
  readonly samples: number
  readonly durationMs: number
  /** Length promised by the file's own header where it counts exactly, else null. */
  readonly declaredDurationMs: number | null
  /** The end of the recording is missing. What there is was decoded. */
  readonly isTruncated: boolean
  /** Largest magnitude met; below {@link SILENCE_PEAK} nothing can be heard. */
  readonly peak: number
  readonly isSilent: boolean
  /** What a decoder complained about, for the log; null when nothing. */
  readonly problem: string | null
}

/** A stream of mono samples; `summary` is null until the stream was read to its end. */
export type DecodedAudio = AsyncIterable<Float32Array> & { readonly summary: () => DecodeSummary | null }

/** −80 dBFS: below the noise of any broadcast chain. */
export const SILENCE_PEAK = 1e-4

const MAXIMUM_DURATION_MS = 7 * 24 * 3600 * 1000
/** A declared length may differ by codec delay; more than this much missing means the end was cut off. */
const TRUNCATION_TOLERANCE_SECONDS = 0.15

/** Turns blocks of any rate into blocks of the wanted rate; a change of rate inside the file starts a new filter. */
function createRateAdapter(sampleRateHz: number) {
  let current: { fromHz: number; resampler: Resampler } | null = null
  return {
    push(block: PcmBlock): Float32Array[] {
      const parts: Float32Array[] = []
      if (current && current.fromHz !== block.sampleRateHz) {
        parts.push(current.resampler.finish())
        current = null
      }
      current ??= {
        fromHz: block.sampleRateHz,
        resampler: createResampler(block.sampleRateHz, sampleRateHz),
      }
      parts.push(current.resampler.push(block.samples))
      return parts
    },
    finish: () => (current ? [current.resampler.finish()] : []),
  }
}

async function* resampled(
  blocks: AsyncIterable<PcmBlock>,
  sampleRateHz: number,
): AsyncGenerator<Float32Array, void, undefined> {
  const adapter = createRateAdapter(sampleRateHz)
  for await (const block of blocks) yield* adapter.push(block)
  yield* adapter.finish()
}

type Progress = { samples: number; peak: number; decoder: DecodeSummary['decoder']; problem: string | null }

/** ffmpeg is several times faster and works beside us; the package needs nothing installed and reads what ffmpeg refuses. */
async function chooseDecoders(
  source: ByteSource,
  inspection: Inspection,
  wanted: DecodeOptions['decoder'],
): Promise<DecodeSummary['decoder'][]> {
  if (!canStreamWithPackage(source, inspection)) return ['ffmpeg']
  if (wanted) return [wanted]
  return (await findFfmpeg()) ? ['ffmpeg', 'audio-decode'] : ['audio-decode']
}

async function* decodeBlocks(
  path: string,
  source: ByteSource,
  inspection: Inspection,
  options: DecodeOptions,
  progress: Progress,
): AsyncGenerator<Float32Array, void, undefined> {
  const { sampleRateHz, signal } = options
  let firstError: Error | null = null
  for (const decoder of await chooseDecoders(source, inspection, options.decoder)) {
    progress.decoder = decoder
    const outcome: FfmpegOutcome = { problem: null }
    const input = { path, formatId: inspection.format.id, startOffset: inspection.startOffset }
    const blocks =
      decoder === 'ffmpeg'
        ? decodeWithFfmpeg(input, sampleRateHz, outcome, signal)
        : decodeWithPackage(source, inspection)
    try {
      yield* resampled(blocks, sampleRateHz)
      progress.problem = outcome.problem
    } catch (error) {
      signal?.throwIfAborted()
      firstError ??= error instanceof AudioError ? error : undecodable(String(error))
      progress.problem = String(error)
    }
    // What was decoded counts; only a recording that gave nothing is tried again and at last refused.
    if (progress.samples > 0) return
  }
  if (firstError) throw firstError
}

function peakOf(block: Float32Array, peak: number): number {
  let largest = peak
  for (let i = 0; i < block.length; i++) {
    const magnitude = Math.abs(block[i] ?? 0)
    if (magnitude > largest) largest = magnitude
  }
  return largest
}

function summarise(inspection: Inspection, progress: Progress, sampleRateHz: number): DecodeSummary {
  const { format, wave, durationSeconds } = inspection
  const seconds = progress.samples / sampleRateHz
  const declared = inspection.isDurationExact
    ? wave?.declaredDataBytes
      ? wave.declaredDataBytes / wave.format.blockBytes / wave.format.sampleRateHz
      : durationSeconds
    : null
  const isShort = declared !== null && declared - seconds > TRUNCATION_TOLERANCE_SECONDS
  return {
    format,
    decoder: progress.decoder,
    samples: progress.samples,
    durationMs: Math.round(seconds * 1000),
    declaredDurationMs: declared === null ? null : Math.round(declared * 1000),
    isTruncated: inspection.isCutOff || isShort,
    peak: progress.peak,
    isSilent: progress.peak < SILENCE_PEAK,
    problem: progress.problem,
  }
}

async function* readMono(
  path: string,
  options: DecodeOptions,
  report: (summary: DecodeSummary) => void,
): AsyncGenerator<Float32Array, void, undefined> {
  const { sampleRateHz, signal, maximumDurationMs = MAXIMUM_DURATION_MS } = options
  if (!Number.isInteger(sampleRateHz) || sampleRateHz <= 0) throw new RangeError('sampleRateHz')
  signal?.throwIfAborted()
  const source = await openByteSource(path)
  try {
    const inspection = await inspectAudio(path, source)
    const progress: Progress = { samples: 0, peak: 0, decoder: 'audio-decode', problem: null }
    for await (const block of decodeBlocks(path, source, inspection, options, progress)) {
      signal?.throwIfAborted()
      if (block.length === 0) continue
      progress.samples += block.length
      progress.peak = peakOf(block, progress.peak)
      if ((progress.samples / sampleRateHz) * 1000 > maximumDurationMs) throw tooLong(maximumDurationMs)
      yield block
    }
    if (progress.samples === 0) throw noSamples()
    report(summarise(inspection, progress, sampleRateHz))
  } finally {
    await source.close()
  }
}

function tooLong(maximumDurationMs: number): AudioError {
  const hours = Math.floor(maximumDurationMs / 3_600_000)
  return new AudioError(
    'too-long',
    `The recording is longer than the ${hours} hours that are accepted. Please send it in parts.`,
  )
}

/**
 * Decodes a recording to mono at any sample rate, as a stream with bounded memory. Samples are within about ±1 (codecs
 * may overshoot); sample n is the sound at n / sampleRateHz seconds. The same file always gives the same samples. Each
 * block is the caller's to keep. Stopping early (break, abort) releases the file and ends any child process.
 *
 * A cut-off recording gives what is there; `summary()` says so afterwards.
 * @throws AudioError while iterating, when the file is not usable audio; the signal's reason when aborted.
 */
export function decodeMono(path: string, options: DecodeOptions): DecodedAudio {
  let summary: DecodeSummary | null = null
  return {
    [Symbol.asyncIterator]: () =>
      readMono(path, options, (result) => {
        summary = result
      }),
    summary: () => summary,
  }
}
