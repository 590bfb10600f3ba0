import { AudioError } from '../audio-error.ts'
import { fromPcm16Wave } from '../encode/wave-header.ts'
import { resample } from '../resample/resampler.ts'
import { LARGEST_PEAK } from './bend-peak.ts'
import { runProgram } from '../processes.ts'

/** How a text is spoken. */
export type Voice = {
  /** An espeak-ng voice name such as `en-gb` or `en-us+f3`. */
  readonly name: string
  readonly wordsPerMinute?: number
  /** 0 … 99, 50 is normal. */
  readonly pitch?: number
  readonly sampleRateHz: number
}

/** RMS of the parts that are spoken is brought to about this. */
const TARGET_RMS = 10 ** (-20 / 20)

/**
 * Speaks a text with espeak-ng, at a steady loudness and within ±0.92. Null when espeak-ng is not installed.
 * @throws AudioError `undecodable` when espeak-ng fails or does not know the voice.
 */
export async function renderSpeech(text: string, voice: Voice): Promise<Float32Array | null> {
  const { name, wordsPerMinute = 165, pitch = 50, sampleRateHz } = voice
  const args = ['-v', name, '-s', `${wordsPerMinute}`, '-p', `${pitch}`, '--stdout', '--stdin']
  try {
    const { code, stdout, stderr } = await runProgram('espeak-ng', args, { input: text })
    if (code !== 0) throw new AudioError('undecodable', 'The text could not be spoken.', stderr)
    const spoken = fromPcm16Wave(stdout)
    return normalise(resample(spoken.samples, spoken.sampleRateHz, sampleRateHz))
  } catch (error) {
    if (error instanceof AudioError && error.code === 'decoder-missing') return null
    throw error
  }
}

function normalise(samples: Float32Array): Float32Array {
  let sum = 0
  let peak = 0
  for (let i = 0; i < samples.length; i++) {
    const value = samples[i] ?? 0
    sum += value * value
    peak = Math.max(peak, Math.abs(value))
  }
  if (peak === 0) return samples
  const gain = Math.min(LARGEST_PEAK / peak, TARGET_RMS / Math.sqrt(sum / samples.length))
  return samples.map((value) => gain * value)
}
