import type { HopFeatures } from './hop-features.ts'

function meanOf(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / Math.max(1, values.length)
}

function deviationOf(values: readonly number[]): number {
  const mean = meanOf(values)
  return Math.sqrt(meanOf(values.map((value) => (value - mean) ** 2)))
}

/**
 * Numbers over a few seconds in which speech and music differ: gaps between syllables, uneven loudness and spectrum in
 * speech; held tones in music. After Scheirer & Slaney, ICASSP 1997.
 */
export function describeWindow(hops: readonly HopFeatures[]): readonly number[] {
  const levels = hops.flatMap((hop) => hop.levels)
  const mean = meanOf(levels)
  const quietShare = levels.filter((level) => level < 0.5 * mean).length / Math.max(1, levels.length)
  return [
    quietShare,
    mean > 0 ? deviationOf(levels) / mean : 0,
    meanOf(hops.map((hop) => hop.flatness)),
    deviationOf(hops.map((hop) => hop.crossings)),
    deviationOf(hops.map((hop) => hop.centroid)),
    meanOf(hops.map((hop) => hop.steadiness)),
    Math.max(0, ...hops.map((hop) => hop.steadiness)),
  ]
}
