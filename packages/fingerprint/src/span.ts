/** First and last hit of a stretch, as indexes into the hits. */
export type Span = { readonly first: number; readonly last: number }

/** Hits expected by chance per frame, and what one frame adds to the dispersion of a Poisson law. */
export type BackgroundRate = { readonly backgroundPerFrame: number; readonly dispersionPerFrame: number }

/** A stretch may be this much sparser than its middle and still belong to the play (fades, speech above it). */
const SPARSENESS = 0.04
const LOWEST_COST_PER_FRAME = 0.01
/** Music under speech at an edge of a play: how far it may go, and how much likelier than chance it must be (natural log). */
const EDGE_FRAMES = 800
const EDGE_EVIDENCE = 6

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
 * The hit up to which an edge reaches, going from `edge` in steps of `step`: the one at which the likelihood ratio of
 * "hits come at the rate seen" against "hits come by chance" is largest, if it is large enough.
 */
function reachOfEdge(frames: Float64Array, edge: number, step: 1 | -1, background: BackgroundRate): number {
  const { backgroundPerFrame, dispersionPerFrame } = background
  let reach = edge
  let best = EDGE_EVIDENCE
  for (let i = edge + step; i >= 0 && i < frames.length; i += step) {
    const length = Math.abs(frames[i] - frames[edge])
    if (length > EDGE_FRAMES) break
    const count = Math.abs(i - edge)
    const expected = Math.max(1e-3, backgroundPerFrame * length)
    if (count <= expected) continue
    const evidence =
      (count * Math.log(count / expected) - (count - expected)) / (1 + dispersionPerFrame * length)
    if (evidence > best) {
      best = evidence
      reach = i
    }
  }
  return reach
}

/**
 * The stretch with the largest sum when each hit earns one and each frame costs a fixed amount (the maximum-likelihood
 * change points of a Poisson rate), lengthened at both edges as far as hits come faster than by chance. The cost
 * follows from the rate in the middle, so it is found in two passes.
 */
export function bestSpan(frames: Float64Array, background: BackgroundRate): Span | null {
  if (frames.length === 0) return null
  const lowest = Math.max(LOWEST_COST_PER_FRAME, 3 * background.backgroundPerFrame)
  const rough = heaviest(frames, lowest)
  const rate = (rough.last - rough.first + 1) / (frames[rough.last] - frames[rough.first] + 32)
  const { first, last } = heaviest(frames, Math.max(lowest, SPARSENESS * rate))
  return {
    first: reachOfEdge(frames, first, -1, background),
    last: reachOfEdge(frames, last, 1, background),
  }
}
