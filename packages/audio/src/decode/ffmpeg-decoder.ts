import { decoderMissing, undecodable, AudioError } from '../audio-error.ts'
import type { AudioFormatId } from '../formats/audio-format.ts'
import { runProgram, startProgram } from '../processes.ts'
import type { PcmBlock } from './pcm-source.ts'

/** How an ffmpeg child ended, beyond the samples it gave. */
export type FfmpegOutcome = { problem: string | null }

/** The recording as it was recognised; ffmpeg is not left to guess again. */
export type FfmpegInput = {
  readonly path: string
  readonly formatId: AudioFormatId
  /** Bytes of tags and garbage before the first frame. */
  readonly startOffset: number
}

const DEMUXERS: { readonly [Id in AudioFormatId]: string } = {
  mp3: 'mp3',
  mp2: 'mp3',
  wav: 'wav',
  flac: 'flac',
  'ogg-vorbis': 'ogg',
  'ogg-opus': 'ogg',
  'ogg-flac': 'ogg',
  m4a: 'mov',
  aac: 'aac',
}
/** libsoxr keeps aliases below −140 dB at no more time than ffmpeg's own default, which lets −15 dB through. */
const PRECISE_RESAMPLER = ['-resampler', 'soxr']
const OWN_RESAMPLER = ['-filter_size', '64', '-cutoff', '0.96']

let installed: Promise<{ hasSoxr: boolean } | null> | null = null

async function lookForFfmpeg(): Promise<{ hasSoxr: boolean } | null> {
  try {
    const { code, stdout } = await runProgram('ffmpeg', ['-version'])
    return code === 0 ? { hasSoxr: stdout.toString('utf8').includes('--enable-libsoxr') } : null
  } catch (error) {
    if (error instanceof AudioError && error.code === 'decoder-missing') return null
    throw error
  }
}

/** Whether ffmpeg can be started here, and what it can do; looked up once. Null when it is not installed. */
export function findFfmpeg(): Promise<{ hasSoxr: boolean } | null> {
  installed ??= lookForFfmpeg()
  return installed
}

/** Opens a recording as what it is, local files only, and past its tags. Other input options go before. */
export function demuxerArguments({ path, formatId, startOffset }: FfmpegInput): string[] {
  const skip = startOffset > 0 ? ['-skip_initial_bytes', `${startOffset}`] : []
  return ['-protocol_whitelist', 'file,pipe', '-f', DEMUXERS[formatId], ...skip, '-i', `file:${path}`]
}

function argumentsFor(input: FfmpegInput, sampleRateHz: number, hasSoxr: boolean): string[] {
  return [
    ...['-nostdin', '-hide_banner', '-v', 'error', ...demuxerArguments(input)],
    ...['-map', '0:a:0', '-vn', '-sn', '-dn'],
    // Float output is not kept below full scale by default; the same level as our own mix is wanted.
    ...['-ac', '1', '-ar', `${sampleRateHz}`, '-rematrix_maxval', '1'],
    ...(hasSoxr ? PRECISE_RESAMPLER : OWN_RESAMPLER),
    ...['-f', 'f32le', 'pipe:1'],
  ]
}

/** Turns a stream of bytes, cut anywhere, into blocks of samples. */
async function* readSamples(bytes: AsyncIterable<unknown>): AsyncGenerator<Float32Array, void, undefined> {
  let carry = new Uint8Array(0)
  for await (const part of bytes) {
    if (!(part instanceof Uint8Array)) continue
    const length = carry.length + part.length
    const whole = length - (length % 4)
    // Copied so that the samples start on a multiple of four bytes.
    const joined = new Uint8Array(length)
    joined.set(carry)
    joined.set(part, carry.length)
    carry = joined.slice(whole)
    if (whole > 0) yield new Float32Array(joined.buffer, 0, whole / 4)
  }
}

/**
 * Streams mono samples at the wanted rate from an ffmpeg child. The child waits while we do (the pipe is full) and is
 * killed and reaped when the consumer stops early.
 * @throws AudioError `decoder-missing`, or `undecodable`/`no-audio-stream` when nothing at all could be decoded.
 */
export async function* decodeWithFfmpeg(
  input: FfmpegInput,
  sampleRateHz: number,
  outcome: FfmpegOutcome,
  signal?: AbortSignal,
): AsyncGenerator<PcmBlock, void, undefined> {
  const found = await findFfmpeg()
  if (!found) throw decoderMissing('ffmpeg')
  signal?.throwIfAborted()
  const { child, ended } = startProgram('ffmpeg', argumentsFor(input, sampleRateHz, found.hasSoxr), signal)
  child.stdin.end()
  let samplesOut = 0
  try {
    for await (const samples of readSamples(child.stdout)) {
      samplesOut += samples.length
      yield { samples, sampleRateHz }
    }
    const { code, stderr } = await ended
    signal?.throwIfAborted()
    if (samplesOut === 0 && code !== 0) throw explainFailure(stderr)
    outcome.problem = stderr === '' ? null : stderr.split('\n').slice(-3).join('; ')
  } finally {
    child.stdout.destroy()
    child.kill('SIGKILL')
    await ended
  }
}

function explainFailure(stderr: string): AudioError {
  if (stderr.includes('matches no streams')) {
    return new AudioError(
      'no-audio-stream',
      'The file holds no sound, only pictures or data. Please send the audio recording.',
      stderr,
    )
  }
  return undecodable(stderr)
}
