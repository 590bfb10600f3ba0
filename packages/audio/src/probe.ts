import { openByteSource } from './formats/bytes.ts'
import type { AudioFormat } from './formats/audio-format.ts'
import { inspectAudio } from './inspect.ts'

/** What can be said of a recording without decoding it. */
export type AudioProbe = {
  readonly format: AudioFormat
  /** Best quick estimate; 0 when the file does not say. Decoding gives the true figure. */
  readonly durationMs: number
  readonly channels: number
  readonly sampleRateHz: number
}

/**
 * Tells format, length, channels and sample rate from the headers, in milliseconds of work however long the recording.
 * @throws AudioError with words for the person who sent the file.
 */
export async function probeAudio(path: string): Promise<AudioProbe> {
  const source = await openByteSource(path)
  try {
    const { format, durationSeconds, channels, sampleRateHz } = await inspectAudio(path, source)
    return { format, durationMs: Math.round(durationSeconds * 1000), channels, sampleRateHz }
  } finally {
    await source.close()
  }
}
