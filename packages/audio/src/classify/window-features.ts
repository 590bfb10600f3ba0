import type { HopFeatures } from './hop-features.ts'

type Measure = (hop: HopFeatures) => number

function meanOf(hops: readonly HopFeatures[], measure: Measure): number {
  let sum = 0
  for (const hop of hops) sum += measure(hop)
  return sum / Math.max(1, hops.length)
}

function deviationOf(hops: readonly HopFeatures[], measure: Measure): number {
  const mean = meanOf(hops, measure)
  return Math.sqrt(meanOf(hops, (hop) => (measure(hop) - mean) ** 2))
}

/** How uneven the loudness is: share of moments below half the mean, and deviation over mean. */
function describeLevels(hops: readonly HopFeatures[]): { quietShare: number; unevenness: number } {
  let count = 0
  let sum = 0
  for (const { levels } of hops) {
    for (const level of levels) sum += level
    count += levels.length
  }
  if (count === 0 || sum === 0) return { quietShare: 0, unevenness: 0 }
  const mean = sum / count
  let quiet = 0
  let squares = 0
  for (const { levels } of hops) {
    for (const level of levels) {
      if (level < 0.5 * mean) quiet += 1
      squares += (level - mean) ** 2
    }
  }
  return { quietShare: quiet / count, unevenness: Math.sqrt(squares / count) / mean }
}

/**
 * Numbers over a few seconds in which speech and music differ: gaps between syllables, uneven loudness and spectrum in
 * speech; held tones in music. After Scheirer & Slaney, ICASSP 1997.
 */
export function describeWindow(hops: readonly HopFeatures[]): readonly number[] {
  const { quietShare, unevenness } = describeLevels(hops)
  let steadiest = 0
  for (const { steadiness } of hops) steadiest = Math.max(steadiest, steadiness)
  return [
    quietShare,
    unevenness,
    meanOf(hops, (hop) => hop.flatness),
    deviationOf(hops, (hop) => hop.crossings),
    deviationOf(hops, (hop) => hop.centroid),
    meanOf(hops, (hop) => hop.steadiness),
    steadiest,
  ]
}
