import { decoderMissing, undecodable, AudioError } from '../audio-error.ts'
import { startProgram } from '../processes.ts'
import type { PcmBlock } from './pcm-source.ts'

/** How an ffmpeg child ended, beyond the samples it gave. */
export type FfmpegOutcome = { problem: string | null }

/**
 * Streams mono samples at the wanted rate from an ffmpeg child. The child waits while we do (the pipe is full) and is
 * killed and reaped when the consumer stops early.
 * @throws AudioError `decoder-missing`, or `undecodable`/`no-audio-stream` when nothing at all could be decoded.
 */
export async function* decodeWithFfmpeg(
  path: string,
  sampleRateHz: number,
  outcome: FfmpegOutcome,
  signal?: AbortSignal,
): AsyncGenerator<PcmBlock, void, undefined> {
  const args = ['-nostdin', '-hide_banner', '-v', 'error', '-i', `file:${path}`, '-map', '0:a:0', '-vn']
  // Float output is not kept below full scale by default; the same level as our own mix is wanted.
  const conversion = [
    '-ac',
    '1',
    '-ar',
    `${sampleRateHz}`,
    '-rematrix_maxval',
    '1',
    '-filter_size',
    '64',
    '-cutoff',
    '0.96',
  ]
  const { child, ended } = startProgram('ffmpeg', [...args, ...conversion, '-f', 'f32le', 'pipe:1'], signal)
  child.stdin.end()
  let samplesOut = 0
  try {
    let carry = Buffer.alloc(0)
    for await (const part of child.stdout) {
      if (!(part instanceof Uint8Array)) continue
      const bytes = carry.length > 0 ? Buffer.concat([carry, part]) : part
      const whole = bytes.length - (bytes.length % 4)
      carry = Buffer.from(bytes.subarray(whole))
      // Copied so that the samples start on a multiple of four bytes.
      const samples = new Float32Array(new Uint8Array(bytes.subarray(0, whole)).buffer)
      samplesOut += samples.length
      if (samples.length > 0) yield { samples, sampleRateHz }
    }
    const { code, stderr, missing } = await ended
    signal?.throwIfAborted()
    if (missing) throw decoderMissing('ffmpeg')
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
