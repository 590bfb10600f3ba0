import { mergeHits } from './aligned-hits.ts'
import type { AlignmentEvidence } from './alignment.ts'
import { claimFor, type Claim } from './detection.ts'

/** Pieces of one play lie at most this far apart: speech may cover music for a while. */
export const MERGE_GAP_FRAMES = 1000
/** The reference may run ahead or behind between two pieces by this much, and this share of the time between them. */
const OFFSET_SLACK_FRAMES = 20
const SPEED_SLACK = 0.05

function referenceStart({ evidence, span }: Claim): number {
  return evidence.hits.referenceFrames[span.first]
}

function referenceEnd({ evidence, span }: Claim): number {
  return evidence.hits.referenceFrames[span.last]
}

function isContinuedBy(earlier: Claim, later: Claim): boolean {
  if (earlier.evidence.recording.recordingNumber !== later.evidence.recording.recordingNumber) return false
  const { hits } = earlier.evidence
  const gap = later.startFrame - hits.logFrames[earlier.span.last]
  if (gap > MERGE_GAP_FRAMES || gap < -MERGE_GAP_FRAMES) return false
  const advance = referenceStart(later) - referenceEnd(earlier)
  return Math.abs(advance - gap) <= OFFSET_SLACK_FRAMES + SPEED_SLACK * Math.abs(gap)
}

function spanHits({ evidence: { hits }, span: { first, last } }: Claim) {
  return {
    logFrames: hits.logFrames.slice(first, last + 1),
    targetFrames: hits.targetFrames.slice(first, last + 1),
    referenceFrames: hits.referenceFrames.slice(first, last + 1),
    weights: hits.weights.slice(first, last + 1),
  }
}

function joined(earlier: Claim, later: Claim): Claim {
  const hits = mergeHits([spanHits(earlier), spanHits(later)])
  const stronger = earlier.logChance <= later.logChance ? earlier : later
  const evidence: AlignmentEvidence = { ...stronger.evidence, hits }
  const whole = claimFor(evidence, { first: 0, last: hits.logFrames.length - 1 })
  return { ...whole, logChance: Math.min(whole.logChance, earlier.logChance, later.logChance) }
}

/** Joins the pieces of one play that an edit, a gap or a drift of speed broke apart. Claims come by start. */
export function mergeClaims(claims: readonly Claim[]): Claim[] {
  const merged: Claim[] = []
  for (const claim of claims) {
    const index = merged.findLastIndex((earlier) => isContinuedBy(earlier, claim))
    if (index < 0) merged.push(claim)
    else merged[index] = joined(merged[index], claim)
  }
  return merged
}
