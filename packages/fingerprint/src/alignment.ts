import { createHitCollector, mergeHits, type AlignedHits } from './aligned-hits.ts'
import { createOffsetBackground, type BackgroundLaw } from './background.ts'
import { BLOCK_FRAMES, type BlockLandmarks, type SpeedVariant } from './block-landmarks.ts'
import type { PlacedRecording } from './catalogue-index.ts'
import { firstSlotAt } from './index-segment.ts'
import { bestSpan, type Span } from './span.ts'
import { logOverdispersedTail } from './statistics.ts'

/** What speaks for one recording at one alignment. Frames of the log are those of the recording. */
export type AlignmentEvidence = {
  readonly recording: PlacedRecording
  readonly variant: SpeedVariant
  readonly hits: AlignedHits
  /** Hits expected by chance per frame of the log, and what one frame adds to the dispersion of a Poisson law. */
  readonly backgroundPerFrame: number
  readonly dispersionPerFrame: number
}

/** Follows one recording through the log along one alignment. Frames of the log are given brought to speed. */
export type Alignment = {
  readonly recording: PlacedRecording
  readonly variant: SpeedVariant
  /** Looks the landmarks of a block (made for this variant and segment) up on the alignment and follows its drift. */
  readonly probe: (landmarks: BlockLandmarks) => void
  /** Turns to the blocks before the first one, nearest first; `false` turns back to the newest. */
  readonly setBackward: (isBackward: boolean) => void
  readonly referenceFrameAt: (logFrame: number) => number
  /** How much the speed differs from the variant's, as a ratio. */
  readonly drift: () => number
  readonly hitsSince: (logFrame: number) => number
  readonly hitCount: () => number
  readonly expectedHits: (frames: number) => number
  readonly evidence: () => AlignmentEvidence
}

/** Hits lie within this many frames of the line. */
const TOLERANCE_FRAMES = 3
/** However common a hash is, it still says this much of what a unique one says. */
const LOWEST_WEIGHT = 0.2

function evidenceOf(
  recording: PlacedRecording,
  variant: SpeedVariant,
  hits: AlignedHits,
  { mean, dispersion }: BackgroundLaw,
  frames: number,
): AlignmentEvidence {
  const backgroundPerFrame = mean / frames
  const dispersionPerFrame = (dispersion - 1) / frames
  return { recording, variant, hits, backgroundPerFrame, dispersionPerFrame }
}

/** Starts to follow a recording at an offset (reference frame minus frame of the log brought to speed). */
export function createAlignment(
  recording: PlacedRecording,
  offset: number,
  variant: SpeedVariant,
  totalFrames: number,
): Alignment {
  const { segment, segmentStart, frames: length } = recording
  const { positions } = segment
  const forward = createHitCollector({ slope: 1, intercept: offset })
  const background = createOffsetBackground(length)
  const information = Math.log(Math.max(16, totalFrames))
  let backward = createHitCollector(forward.line)
  let current = forward
  let lastAnchor = -1
  let probedFrames = 0

  const probeOne = (
    slot: number,
    end: number,
    commonness: number,
    logFrame: number,
    targetFrame: number,
  ): void => {
    // A common hash tells less: it weighs as its information against that of a hash found only once.
    const weight = Math.max(LOWEST_WEIGHT, 1 - Math.log(commonness) / information)
    const predicted = logFrame * current.line.slope + current.line.intercept
    for (; slot < end; slot++) {
      const referenceFrame = positions[slot] - segmentStart
      if (referenceFrame >= length) break
      const residual = referenceFrame - predicted
      if (Math.abs(residual) > TOLERANCE_FRAMES) background.add(residual, logFrame, weight)
      else if (logFrame !== lastAnchor) {
        lastAnchor = logFrame
        current.add(logFrame, targetFrame, referenceFrame, weight)
      }
    }
  }

  const probe = ({ anchorFrames, targetFrames, firstSlots, endSlots }: BlockLandmarks): void => {
    for (let i = 0; i < anchorFrames.length; i++) {
      const start = firstSlots[i]
      const end = endSlots[i]
      const slot = firstSlotAt(positions, start, end, segmentStart)
      if (slot === end || positions[slot] >= segmentStart + length) continue
      probeOne(slot, end, end - start, anchorFrames[i], targetFrames[i])
    }
    probedFrames += BLOCK_FRAMES * variant.speedRatio
    current.followDrift()
  }

  return {
    recording,
    variant,
    probe,
    setBackward(isBackward) {
      if (isBackward) backward = createHitCollector(forward.line)
      current = isBackward ? backward : forward
      lastAnchor = -1
    },
    referenceFrameAt: (logFrame) => logFrame * forward.line.slope + forward.line.intercept,
    drift: () => Math.abs(forward.line.slope - 1),
    hitsSince: forward.countSince,
    hitCount: () => forward.count() + backward.count(),
    expectedHits: (frames) => (background.roughMean() * frames) / Math.max(1, probedFrames),
    evidence: () =>
      evidenceOf(
        recording,
        variant,
        mergeHits([backward.hits(variant.speedRatio), forward.hits(variant.speedRatio)]),
        background.law(),
        Math.max(1, probedFrames) / variant.speedRatio,
      ),
  }
}

/** Natural logarithm of the chance that a wrong offset of this recording gathers the hits of the span. */
export function logChanceOf(evidence: AlignmentEvidence, span: Span): number {
  const { hits, backgroundPerFrame, dispersionPerFrame } = evidence
  let weight = 0
  for (let i = span.first; i <= span.last; i++) weight += hits.weights[i]
  const frames = hits.logFrames[span.last] - hits.logFrames[span.first] + 64
  return logOverdispersedTail(weight, backgroundPerFrame * frames, 1 + dispersionPerFrame * frames)
}

/** The stretch of an alignment where hits come clearly faster than by chance. */
export function spanOf(evidence: AlignmentEvidence): Span | null {
  return bestSpan(evidence.hits.logFrames, evidence)
}
