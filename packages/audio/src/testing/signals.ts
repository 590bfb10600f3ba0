import { decodeMono, type DecodeOptions, type DecodeSummary } from '../decode/decode-mono.ts'
import { createRandom } from '../synthesis/random.ts'

/** A sine of amplitude 0.5. */
export function sine(frequencyHz: number, seconds: number, sampleRateHz: number): Float32Array {
  return Float32Array.from(
    { length: Math.round(seconds * sampleRateHz) },
    (_, i) => 0.5 * Math.sin((2 * Math.PI * frequencyHz * i) / sampleRateHz),
  )
}

/** Band-limited noise whose loudness changes all the time: it fits itself at one offset only. */
export function unevenNoise(seconds: number, sampleRateHz: number, seed = 1): Float32Array {
  const random = createRandom(seed)
  const samples = new Float32Array(Math.round(seconds * sampleRateHz))
  let low = 0
  let level = 0
  for (let i = 0; i < samples.length; i++) {
    if (i % Math.round(sampleRateHz / 7) === 0) level = random.between(0.1, 1)
    low += 0.15 * (random.between(-1, 1) - low)
    samples[i] = level * low
  }
  return samples
}

/** Root mean square of samples, in decibels below full scale. */
export function rmsDb(samples: Float32Array): number {
  return 10 * Math.log10(samples.reduce((sum, value) => sum + value * value, 1e-30) / samples.length)
}

/** Power at one frequency (a single term of the discrete Fourier transform, Hann window). */
export function powerAt(samples: Float32Array, frequencyHz: number, sampleRateHz: number): number {
  let real = 0
  let imaginary = 0
  samples.forEach((value, i) => {
    const hann = 0.5 - 0.5 * Math.cos((2 * Math.PI * i) / samples.length)
    const angle = (2 * Math.PI * frequencyHz * i) / sampleRateHz
    real += hann * value * Math.cos(angle)
    imaginary += hann * value * Math.sin(angle)
  })
  return (real * real + imaginary * imaginary) / samples.length ** 2
}

/** By how many samples `late` lags behind `early`, by the best cross-correlation within a reach, and how well it fits. */
export function lagOf(late: Float32Array, early: Float32Array, reach: number): { lag: number; fit: number } {
  let best = { lag: 0, fit: -Infinity }
  for (let lag = -reach; lag <= reach; lag++) {
    let product = 0
    let powerLate = 0
    let powerEarly = 0
    for (let i = reach; i < Math.min(late.length, early.length) - reach; i++) {
      const left = late[i + lag] ?? 0
      const right = early[i] ?? 0
      product += left * right
      powerLate += left * left
      powerEarly += right * right
    }
    const fit = product / Math.sqrt(powerLate * powerEarly)
    if (fit > best.fit) best = { lag, fit }
  }
  return best
}

/** Whether two recordings are the same to the last bit; far quicker than a comparison sample by sample. */
export function isSameSound(a: Float32Array, b: Float32Array): boolean {
  const bytesOf = ({ buffer, byteOffset, byteLength }: Float32Array) =>
    Buffer.from(buffer, byteOffset, byteLength)
  return bytesOf(a).equals(bytesOf(b))
}

/** Reads a recording to its end. */
export async function readAll(
  path: string,
  options: DecodeOptions,
): Promise<{ samples: Float32Array; summary: DecodeSummary | null }> {
  const decoded = decodeMono(path, options)
  const blocks: Float32Array[] = []
  for await (const block of decoded) blocks.push(block)
  const samples = new Float32Array(blocks.reduce((total, block) => total + block.length, 0))
  let offset = 0
  for (const block of blocks) {
    samples.set(block, offset)
    offset += block.length
  }
  return { samples, summary: decoded.summary() }
}
