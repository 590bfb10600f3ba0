import { measureSpectrum } from './spectral-features.ts'

/** One fifth of a second, and the frames within it. */
export const HOP_SAMPLES = 1600
const LEVEL_SAMPLES = 160
const FRAME_SAMPLES = 512
const FRAME_STARTS = [0, HOP_SAMPLES - FRAME_SAMPLES]

/** What is known of one fifth of a second. */
export type HopFeatures = {
  /** RMS of each fiftieth of a second. */
  readonly levels: readonly number[]
  readonly peak: number
  readonly crossings: number
  readonly flatness: number
  readonly centroid: number
  /** Likeness of the spectra at the beginning and the end, 0 … 1: held notes are alike, syllables are not. */
  readonly steadiness: number
}

function likeness(a: Float32Array, b: Float32Array): number {
  let product = 0
  let powerA = 0
  let powerB = 0
  for (let i = 1; i < a.length; i++) {
    const left = Math.sqrt(a[i] ?? 0)
    const right = Math.sqrt(b[i] ?? 0)
    product += left * right
    powerA += left * left
    powerB += right * right
  }
  return powerA > 0 && powerB > 0 ? product / Math.sqrt(powerA * powerB) : 0
}

/** Measures one hop of {@link HOP_SAMPLES} samples at 8 kHz. */
export function measureHop(samples: Float32Array): HopFeatures {
  const levels: number[] = []
  let peak = 0
  let crossings = 0
  let previous = 0
  for (let start = 0; start < samples.length; start += LEVEL_SAMPLES) {
    let sum = 0
    for (let i = start; i < start + LEVEL_SAMPLES; i++) {
      const value = samples[i] ?? 0
      sum += value * value
      if (value > peak) peak = value
      else if (-value > peak) peak = -value
      if (value >= 0 !== previous >= 0) crossings++
      previous = value
    }
    levels.push(Math.sqrt(sum / LEVEL_SAMPLES))
  }
  const [first, last] = FRAME_STARTS.map((at) => measureSpectrum(samples.slice(at, at + FRAME_SAMPLES)))
  return {
    levels,
    peak,
    crossings: crossings / samples.length,
    flatness: ((first?.flatness ?? 0) + (last?.flatness ?? 0)) / 2,
    centroid: ((first?.centroid ?? 0) + (last?.centroid ?? 0)) / 2,
    steadiness: first && last ? likeness(first.magnitudes, last.magnitudes) : 0,
  }
}
