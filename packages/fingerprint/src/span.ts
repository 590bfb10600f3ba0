/** First and last hit of a stretch, as indexes into the hits. */
export type Span = { readonly first: number; readonly last: number }

/** A stretch may be this much sparser than its middle and still belong to the play (fades, speech above it). */
const SPARSENESS = 0.04
const LOWEST_COST_PER_FRAME = 0.01

function heaviest(frames: Float64Array, costPerFrame: number): Span {
  let best = -Infinity
  let span = { first: 0, last: 0 }
  let sum = 0
  let first = 0
  for (let i = 0; i < frames.length; i++) {
    const decayed = i === 0 ? 0 : sum - (frames[i] - frames[i - 1]) * costPerFrame
    if (decayed <= 0) {
      sum = 1
      first = i
    } else sum = decayed + 1
    if (sum > best) {
      best = sum
      span = { first, last: i }
    }
  }
  return span
}

/**
 * The stretch with the largest sum when each hit earns one and each frame costs a fixed amount (the maximum-likelihood
 * change points of a Poisson rate). The cost follows from the rate in the middle, so it is found in two passes.
 */
export function bestSpan(frames: Float64Array, backgroundPerFrame: number): Span | null {
  if (frames.length === 0) return null
  let cost = Math.max(LOWEST_COST_PER_FRAME, 3 * backgroundPerFrame)
  let span = heaviest(frames, cost)
  const rate = (span.last - span.first + 1) / (frames[span.last] - frames[span.first] + 32)
  cost = Math.max(cost, SPARSENESS * rate)
  span = heaviest(frames, cost)
  return span
}
