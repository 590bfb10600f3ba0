/** Landmarks agree when their offsets fall in the same or the neighbouring bin of this many frames. */
export const OFFSET_BIN_SHIFT = 2
export const OFFSET_BIN_FRAMES = 2 ** OFFSET_BIN_SHIFT

/** Offsets at which a recording resembles itself (bars, loops) say nothing of chance: so many of the highest are left out. */
const SELF_LIKENESS_SHARE = 0.1
/** Gives back the spread that leaving out the highest takes away. */
const SPREAD_ALLOWANCE = 2
/** Landmarks share peaks, so hits come in small groups even by chance. */
const LEAST_DISPERSION = 1.3

/** What chance gives at one offset; dispersion is variance over mean. */
export type BackgroundLaw = { readonly mean: number; readonly dispersion: number }

/** Mean and dispersion of pair counts at offsets that are not the one in question. */
export function describeBackground(pairCounts: ArrayLike<number>): BackgroundLaw {
  const sorted = Float64Array.from(pairCounts).sort()
  const kept = Math.max(1, Math.floor(sorted.length * (1 - SELF_LIKENESS_SHARE)))
  let sum = 0
  let squares = 0
  for (let i = 0; i < kept; i++) {
    sum += sorted[i]
    squares += sorted[i] * sorted[i]
  }
  const mean = Math.max(sum / kept, 0.5 / kept)
  const variance = squares / kept - (sum / kept) ** 2
  return { mean, dispersion: LEAST_DISPERSION + SPREAD_ALLOWANCE * Math.max(0, variance / mean - 1) }
}

/** Hits of one recording at all the offsets beside the alignment. */
export type OffsetBackground = {
  /** Counts a hit this many frames off the alignment; an anchor counts once an offset. */
  readonly add: (residualFrames: number, anchorFrame: number, weight: number) => void
  readonly law: () => BackgroundLaw
  /** Mean of the law without leaving anything out: quick, and a little high. */
  readonly roughMean: () => number
}

/** Offsets wrap around at the recording's length, so that each is met equally often. */
export function createOffsetBackground(lengthFrames: number): OffsetBackground {
  const counts = new Float64Array(Math.max(16, (lengthFrames >> OFFSET_BIN_SHIFT) + 1))
  const lastAnchors = new Float64Array(counts.length).fill(-1)
  let total = 0
  return {
    add(residualFrames, anchorFrame, weight) {
      const wrapped = residualFrames - Math.floor(residualFrames / lengthFrames) * lengthFrames
      const bin = Math.floor(wrapped / OFFSET_BIN_FRAMES)
      if (lastAnchors[bin] === anchorFrame) return
      lastAnchors[bin] = anchorFrame
      counts[bin] += weight
      total += weight
    },
    law: () => describeBackground(counts.map((count, i) => count + counts[(i + 1) % counts.length])),
    roughMean: () => (2 * total) / counts.length,
  }
}
