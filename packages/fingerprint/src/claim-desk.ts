import type { AlignmentEvidence } from './alignment.ts'
import type { CatalogueIndex } from './catalogue-index.ts'
import {
  describeClaim,
  logFalseAlarms,
  strongestClaim,
  type Claim,
  type Detection,
  type DetectionThresholds,
} from './detection.ts'
import { MERGE_GAP_FRAMES, mergeClaims } from './merge-claims.ts'
import { SECONDS_PER_FRAME } from './parameters.ts'
import { resolveClaims, type Explained } from './resolve.ts'
import { SPEED_VARIANTS } from './speed-search.ts'
import { LOOK_BACK_BLOCKS } from './tracker.ts'
import { BLOCK_FRAMES } from './block-landmarks.ts'

/** Collects what ended alignments claim, and decides between claims once nothing still running can overlap them. */
export type ClaimDesk = {
  readonly take: (ended: readonly AlignmentEvidence[]) => void
  /** `openFrame`: everything before it in the log is known; `logSeconds`: how much of the log there is. */
  readonly settle: (openFrame: number, logSeconds: number) => Detection[]
}

/** Final stretches are remembered this long against echoes found late. */
const MEMORY_FRAMES = (LOOK_BACK_BLOCKS + 20) * BLOCK_FRAMES

function isSparse({ span, startFrame, endFrame }: Claim, thresholds: DetectionThresholds): boolean {
  const seconds = (endFrame - startFrame) * SECONDS_PER_FRAME
  const hits = span.last - span.first + 1
  return seconds < thresholds.sparseSeconds && hits < thresholds.sparseHitsPerSecond * seconds
}

export function createClaimDesk(index: CatalogueIndex, thresholds: DetectionThresholds): ClaimDesk {
  const { totalFrames } = index
  let waiting: Claim[] = []
  let explained: Explained[] = []

  const falseAlarmsOf = ({ evidence, logChance }: Claim): number => {
    const speeds = evidence.variant.speedRatio === 1 ? 1 : SPEED_VARIANTS.length
    return Math.exp(logFalseAlarms(logChance, totalFrames, speeds))
  }
  const isSignificant = (claim: Claim): boolean =>
    falseAlarmsOf(claim) <= thresholds.reviewFalseAlarms &&
    (claim.endFrame - claim.startFrame) * SECONDS_PER_FRAME >= thresholds.shortestSeconds
  const describe = (claim: Claim, logSeconds: number): Detection => {
    const falseAlarms = falseAlarmsOf(claim)
    const isSure = falseAlarms <= thresholds.acceptFalseAlarms && !isSparse(claim, thresholds)
    const decision = isSure ? 'accept' : 'review'
    return describeClaim(claim, falseAlarms, decision, logSeconds)
  }

  return {
    take(ended) {
      for (const evidence of ended) {
        const claim = strongestClaim(evidence)
        if (claim && isSignificant(claim)) waiting.push(claim)
      }
    },
    settle(openFrame, logSeconds) {
      if (waiting.length === 0) return []
      const end = waiting.reduce((latest, claim) => Math.max(latest, claim.endFrame), 0)
      if (end + MERGE_GAP_FRAMES >= openFrame) return []
      const standing = mergeClaims(resolveClaims(waiting, explained, isSignificant))
      waiting = []
      explained = explained.filter(({ endFrame }) => endFrame > end - MEMORY_FRAMES)
      for (const { evidence, startFrame, endFrame } of standing) {
        explained.push({ recordingNumber: evidence.recording.recordingNumber, startFrame, endFrame })
      }
      return standing.map((claim) => describe(claim, logSeconds))
    },
  }
}
