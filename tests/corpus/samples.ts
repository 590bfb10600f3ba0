import { runProgram } from './run-program.ts'

/** Mono samples at one rate, as everything in the corpus is mixed. */
export type Samples = Float32Array

/** The rate of the corpus: enough for a broadcast at 64 kbit/s, light enough to mix in memory. */
export const CORPUS_RATE_HZ = 22_050

function toSamples(bytes: Buffer): Samples {
  const samples = new Float32Array(bytes.length >> 2)
  for (let i = 0; i < samples.length; i++) samples[i] = bytes.readFloatLE(i * 4)
  return samples
}

function toBytes(samples: Samples): Uint8Array {
  return new Uint8Array(samples.buffer, samples.byteOffset, samples.byteLength)
}

const RAW = ['-f', 'f32le', '-ac', '1', '-ar']

/** Decodes a file with ffmpeg. */
export async function decodeSamples(path: string, rateHz = CORPUS_RATE_HZ): Promise<Samples> {
  return toSamples(await runProgram('ffmpeg', ['-v', 'error', '-i', path, ...RAW, String(rateHz), '-']))
}

/** Passes samples through a chain of ffmpeg filters. */
export async function filterSamples(samples: Samples, filters: string): Promise<Samples> {
  const rate = String(CORPUS_RATE_HZ)
  const args = ['-v', 'error', ...RAW, rate, '-i', '-', '-af', filters, ...RAW, rate, '-']
  return toSamples(await runProgram('ffmpeg', args, { input: toBytes(samples) }))
}

/** Writes samples as MP3 at a bit rate such as `64k`. */
export async function writeMp3(
  samples: Samples,
  path: string,
  { bitRate = '64k', rateHz = CORPUS_RATE_HZ } = {},
): Promise<void> {
  const input = ['-v', 'error', '-y', ...RAW, String(CORPUS_RATE_HZ), '-i', '-']
  const output = ['-ar', String(rateHz), '-b:a', bitRate, path]
  await runProgram('ffmpeg', [...input, ...output], { input: toBytes(samples) })
}

/** Root mean square. */
export function loudnessOf(samples: Samples): number {
  let sum = 0
  for (const sample of samples) sum += sample * sample
  return Math.sqrt(sum / Math.max(1, samples.length))
}

const WORKING_LOUDNESS = 0.1

/** Brings samples to one loudness, so that levels in decibels mean the same for all of them. */
export function levelled(samples: Samples): Samples {
  const factor = WORKING_LOUDNESS / Math.max(1e-6, loudnessOf(samples))
  return samples.map((sample) => sample * factor)
}

/** Adds `added` × gain to a copy of `samples`. */
export function mixed(samples: Samples, added: Samples, gainDb = 0): Samples {
  const gain = 10 ** (gainDb / 20)
  return samples.map((sample, i) => sample + gain * (added[i] ?? 0))
}

export function concatenated(parts: readonly Samples[]): Samples {
  const whole = new Float32Array(parts.reduce((sum, part) => sum + part.length, 0))
  let at = 0
  for (const part of parts) {
    whole.set(part, at)
    at += part.length
  }
  return whole
}
