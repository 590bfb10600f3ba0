import { writeFile } from 'node:fs/promises'
import { Readable, type Writable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { noSamples, undecodable } from './audio-error.ts'
import { demuxerArguments } from './decode/ffmpeg-decoder.ts'
import { waveHeader } from './encode/wave-header.ts'
import { openByteSource } from './formats/bytes.ts'
import { inspectAudio } from './inspect.ts'
import { runProgram } from './processes.ts'

export type ClipRange = { readonly startSeconds: number; readonly durationSeconds: number }

export type ClipOptions = {
  /** Default MP3, which every browser plays and is a tenth of the size. */
  readonly format?: 'mp3' | 'wav'
  readonly signal?: AbortSignal
}

/** Longer stretches are for listening to the recording itself. */
export const LONGEST_CLIP_SECONDS = 300

const SAMPLE_RATE_HZ = 44_100
const ENCODINGS = {
  mp3: {
    mediaType: 'audio/mpeg',
    args: ['-c:a', 'libmp3lame', '-b:a', '96k', '-write_xing', '0', '-id3v2_version', '0', '-f', 'mp3'],
  },
  wav: { mediaType: 'audio/wav', args: ['-c:a', 'pcm_s16le', '-f', 's16le'] },
} as const

async function cut(path: string, range: ClipRange, format: 'mp3' | 'wav', signal?: AbortSignal) {
  const source = await openByteSource(path)
  try {
    const { format: found, startOffset } = await inspectAudio(path, source)
    const input = demuxerArguments({ path, formatId: found.id, startOffset })
    const span = ['-ss', range.startSeconds.toFixed(3), '-t', range.durationSeconds.toFixed(3)]
    const sound = ['-map', '0:a:0', '-vn', '-ac', '1', '-ar', `${SAMPLE_RATE_HZ}`, '-map_metadata', '-1']
    const run = await runProgram(
      'ffmpeg',
      ['-nostdin', '-v', 'error', ...span, ...input, ...sound, ...ENCODINGS[format].args, 'pipe:1'],
      signal ? { signal } : {},
    )
    if (run.stdout.length === 0) throw run.code === 0 ? noSamples() : undecodable(run.stderr)
    return run.stdout
  } finally {
    await source.close()
  }
}

/**
 * Cuts a short clip out of a recording, mono, for listening in a browser, into a file or a stream (which is ended). A
 * clip that reaches beyond the recording ends with it.
 * @throws RangeError for a negative start, or a length that is not between 0 and {@link LONGEST_CLIP_SECONDS}.
 * @throws AudioError `no-samples` when the recording ends before the clip begins; the errors of {@link decodeMono}.
 */
export async function cutClip(
  path: string,
  range: ClipRange,
  output: string | Writable,
  { format = 'mp3', signal }: ClipOptions = {},
): Promise<{ bytes: number; mediaType: string }> {
  const { startSeconds, durationSeconds } = range
  if (!(startSeconds >= 0)) throw new RangeError('startSeconds')
  if (!(durationSeconds > 0 && durationSeconds <= LONGEST_CLIP_SECONDS))
    throw new RangeError('durationSeconds')
  signal?.throwIfAborted()
  const body = await cut(path, range, format, signal)
  const header = format === 'wav' ? waveHeader(SAMPLE_RATE_HZ, body.length) : new Uint8Array(0)
  const clip = Buffer.concat([header, body])
  if (typeof output === 'string') await writeFile(output, clip)
  else await pipeline(Readable.from([clip]), output)
  return { bytes: clip.length, mediaType: ENCODINGS[format].mediaType }
}
