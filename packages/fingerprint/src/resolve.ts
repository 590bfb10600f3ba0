import { claimFor, type Claim } from './detection.ts'
import { bestSpan, type Span } from './span.ts'

/** A crossfade: two plays may overlap for this long without one of them being the other's echo. */
const CROSSFADE_FRAMES = 400
const FEWEST_HITS_OUTSIDE = 5
const UNCHANGED_SPEED_ADVANTAGE = 1.15

/** A stretch of the log that is explained already. */
export type Explained = {
  readonly recordingNumber: number
  readonly startFrame: number
  readonly endFrame: number
}

/** Stretches of hits outside everything explained, in the order of time. */
function hitsOutside(claim: Claim, explained: readonly Explained[]): Span[] {
  const { hits } = claim.evidence
  const spans: Span[] = []
  let first = -1
  for (let i = claim.span.first; i <= claim.span.last + 1; i++) {
    const frame = i <= claim.span.last ? hits.logFrames[i] : -1
    const isOutside =
      frame >= 0 && !explained.some(({ startFrame, endFrame }) => frame >= startFrame && frame <= endFrame)
    if (isOutside && first < 0) first = i
    if (!isOutside && first >= 0) {
      spans.push({ first, last: i - 1 })
      first = -1
    }
  }
  return spans
}

function restricted(claim: Claim, part: Span): Claim {
  const { evidence } = claim
  const tight = bestSpan(evidence.hits.logFrames.slice(part.first, part.last + 1), evidence)
  return claimFor(evidence, tight ? { first: part.first + tight.first, last: part.first + tight.last } : part)
}

/** How far the claim reaches into explained stretches beside the part outside, if only as far as a crossfade. */
function withCrossfade(claim: Claim, part: Claim, explained: readonly Explained[]): Claim {
  const { hits } = claim.evidence
  let { first, last } = part.span
  const isOwn = explained.some(
    (other) =>
      other.recordingNumber === claim.evidence.recording.recordingNumber &&
      other.endFrame > claim.startFrame &&
      other.startFrame < claim.endFrame,
  )
  if (isOwn) return part
  const firstFrame = hits.logFrames[first]
  const lastFrame = hits.logFrames[last]
  while (first > claim.span.first && firstFrame - hits.logFrames[first - 1] <= CROSSFADE_FRAMES) first--
  while (last < claim.span.last && hits.logFrames[last + 1] - lastFrame <= CROSSFADE_FRAMES) last++
  // A claim that goes on further inside is an echo of a shared passage there, not a fade.
  if (first > claim.span.first) first = part.span.first
  if (last < claim.span.last) last = part.span.last
  return claimFor(claim.evidence, { first, last })
}

/** Hits of the claim; a changed speed must explain more than the speed nearly everything is played at. */
function weightOf({ evidence, span }: Claim): number {
  const hits = span.last - span.first + 1
  return evidence.variant.speedRatio === 1 ? hits * UNCHANGED_SPEED_ADVANTAGE : hits
}

/**
 * Decides between overlapping claims: the one with most evidence explains its whole span, and others keep only what
 * lies outside, if `isSignificant` says that part stands on its own. Returns the claims that stand, by start.
 */
export function resolveClaims(
  claims: readonly Claim[],
  earlier: readonly Explained[],
  isSignificant: (claim: Claim) => boolean,
): Claim[] {
  const byEvidence = [...claims].sort(
    (a, b) =>
      weightOf(b) - weightOf(a) ||
      a.startFrame - b.startFrame ||
      a.evidence.recording.recordingNumber - b.evidence.recording.recordingNumber,
  )
  const explained: Explained[] = [...earlier]
  const standing: Claim[] = []
  for (const claim of byEvidence) {
    const parts = hitsOutside(claim, explained).filter(
      ({ first, last }) => last - first + 1 >= FEWEST_HITS_OUTSIDE,
    )
    for (const part of parts) {
      const outside = restricted(claim, part)
      if (!isSignificant(outside)) continue
      const whole = withCrossfade(claim, outside, explained)
      standing.push(whole)
      explained.push({
        recordingNumber: claim.evidence.recording.recordingNumber,
        startFrame: whole.startFrame,
        endFrame: whole.endFrame,
      })
    }
  }
  return standing.sort((a, b) => a.startFrame - b.startFrame)
}
