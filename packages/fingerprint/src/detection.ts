import type { Line } from './aligned-hits.ts'
import { logChanceOf, spanOf, type AlignmentEvidence } from './alignment.ts'
import { OFFSET_BIN_SHIFT } from './background.ts'
import { SECONDS_PER_FRAME } from './parameters.ts'
import type { Span } from './span.ts'

/** One moment of the log and the moment of the reference it agrees with. */
export type EvidencePair = { readonly logSeconds: number; readonly referenceSeconds: number }

export type Detection = {
  readonly recordingNumber: number
  readonly startSeconds: number
  readonly endSeconds: number
  readonly referenceStartSeconds: number
  /** Seconds of the reference per second of the log: above 1 the log runs fast. */
  readonly speedRatio: number
  /** −log10 of the expected false alarms, at most 99. */
  readonly confidence: number
  /** Detections as strong as this one that an hour of other music would give against this catalogue. */
  readonly expectedFalseAlarms: number
  readonly decision: 'accept' | 'review'
  /** Moments of the log at which a landmark agrees. */
  readonly agreeingHashes: number
  /** Spread evenly over the play, at most 200. */
  readonly evidence: readonly EvidencePair[]
}

/** Expected false alarms per hour of log up to which a detection is accepted, and up to which a person is asked. */
export type DetectionThresholds = {
  readonly acceptFalseAlarms: number
  readonly reviewFalseAlarms: number
  readonly shortestSeconds: number
  /**
   * Recordings share loops and samples: a short stretch in which only part of the landmarks agree may be such a passage
   * of another recording, however unlikely chance is, so a person decides.
   */
  readonly sparseHitsPerSecond: number
  readonly sparseSeconds: number
}

export const defaultThresholds: DetectionThresholds = {
  acceptFalseAlarms: 1e-6,
  reviewFalseAlarms: 1e-4,
  shortestSeconds: 3,
  sparseHitsPerSecond: 6,
  sparseSeconds: 20,
}

const MOST_EVIDENCE_PAIRS = 200
const HIGHEST_CONFIDENCE = 99
/** Stretches of this length are as good as independent looks at the log. */
const LOOKS_PER_HOUR = 360
/**
 * A play found from this close to an end of the recording on is taken to reach it: fades hide the rest. A short stretch
 * is more likely an excerpt and reaches less far.
 */
const SNAP_SECONDS = 5
const SNAP_SECONDS_SHORT = 1
const SNAP_SHARE = 0.1

/** Standard deviation of a hit around its line. */
const HIT_SCATTER_FRAMES = 1.2
/** A fitted speed is believed when it differs this many standard errors from the one searched for, or is this exact. */
const SLOPE_DEVIATIONS = 4
const SLOPE_IS_EXACT = 2e-4

/** An alignment with the stretch it holds for, before overlapping ones are weighed against each other. */
export type Claim = {
  readonly evidence: AlignmentEvidence
  readonly span: Span
  readonly startFrame: number
  readonly endFrame: number
  readonly logChance: number
}

/** Frames of the log as recorded (not brought to speed) of a stretch of hits. */
export function claimFor(evidence: AlignmentEvidence, span: Span): Claim {
  const { hits } = evidence
  let endFrame = 0
  for (let i = span.first; i <= span.last; i++) endFrame = Math.max(endFrame, hits.targetFrames[i])
  return {
    evidence,
    span,
    startFrame: hits.logFrames[span.first],
    endFrame,
    logChance: logChanceOf(evidence, span),
  }
}

/** The claim of an alignment's best stretch. */
export function strongestClaim(evidence: AlignmentEvidence): Claim | null {
  const span = spanOf(evidence)
  return span ? claimFor(evidence, span) : null
}

/** Natural logarithm of the false alarms as strong as this claim in an hour of log. */
export function logFalseAlarms(logChance: number, totalFrames: number, speedVariants: number): number {
  return logChance + Math.log((totalFrames >> OFFSET_BIN_SHIFT) * LOOKS_PER_HOUR * speedVariants)
}

function fitLine({ hits, variant }: AlignmentEvidence, { first, last }: Span): Line {
  const count = last - first + 1
  let meanLog = 0
  let meanReference = 0
  for (let i = first; i <= last; i++) {
    meanLog += hits.logFrames[i] / count
    meanReference += hits.referenceFrames[i] / count
  }
  let spread = 0
  let together = 0
  for (let i = first; i <= last; i++) {
    const x = hits.logFrames[i] - meanLog
    spread += x * x
    together += x * (hits.referenceFrames[i] - meanReference)
  }
  const fitted = together / Math.max(1, spread)
  const uncertainty = HIT_SCATTER_FRAMES / Math.sqrt(Math.max(1, spread))
  const isTelling = Math.abs(fitted - variant.speedRatio) > SLOPE_DEVIATIONS * uncertainty
  const slope = isTelling || uncertainty < SLOPE_IS_EXACT ? fitted : variant.speedRatio
  return { slope, intercept: meanReference - slope * meanLog }
}

/** Turns a claim into what is reported, in seconds. */
export function describeClaim(
  claim: Claim,
  falseAlarms: number,
  decision: Detection['decision'],
  logSeconds: number,
): Detection {
  const { evidence, span, startFrame, endFrame } = claim
  const { hits, recording } = evidence
  const line = fitLine(evidence, span)
  const speedRatio = line.slope
  const length = recording.frames * SECONDS_PER_FRAME
  const referenceAt = (frame: number) => (frame * line.slope + line.intercept) * SECONDS_PER_FRAME
  let startSeconds = startFrame * SECONDS_PER_FRAME
  let endSeconds = endFrame * SECONDS_PER_FRAME
  const snap = Math.min(SNAP_SECONDS, SNAP_SECONDS_SHORT + SNAP_SHARE * (endSeconds - startSeconds))
  const missingStart = referenceAt(startFrame)
  const missingEnd = length - referenceAt(endFrame)
  if (missingStart <= snap) startSeconds = Math.max(0, startSeconds - missingStart / speedRatio)
  if (missingEnd <= snap) endSeconds = Math.min(logSeconds, endSeconds + missingEnd / speedRatio)
  const step = Math.max(1, Math.ceil((span.last - span.first + 1) / MOST_EVIDENCE_PAIRS))
  const pairs: EvidencePair[] = []
  for (let i = span.first; i <= span.last; i += step) {
    pairs.push({
      logSeconds: hits.logFrames[i] * SECONDS_PER_FRAME,
      referenceSeconds: hits.referenceFrames[i] * SECONDS_PER_FRAME,
    })
  }
  return {
    recordingNumber: recording.recordingNumber,
    startSeconds,
    endSeconds,
    referenceStartSeconds: Math.max(0, referenceAt(startSeconds / SECONDS_PER_FRAME)),
    speedRatio,
    confidence: Math.min(HIGHEST_CONFIDENCE, -Math.log10(Math.max(Number.MIN_VALUE, falseAlarms))),
    expectedFalseAlarms: falseAlarms,
    decision,
    agreeingHashes: span.last - span.first + 1,
    evidence: pairs,
  }
}
