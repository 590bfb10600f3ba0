import type { PlacedRecording } from './catalogue-index.ts'
import { createNumberList, type NumberList } from './growable.ts'
import { endOfHash, firstSlotAt, startOfHash } from './index-segment.ts'
import { describeBackground, OFFSET_BIN_SHIFT } from './offset-histogram.ts'
import { bestSpan, type Span } from './span.ts'
import { logOverdispersedTail } from './statistics.ts'

/** How the sound of the log was changed against the reference; times of the log are first multiplied by the ratio. */
export type SpeedVariant = { readonly speedRatio: number; readonly pitchFollowsSpeed: boolean }

/** Landmarks of the log that lie on the alignment, in order of time. Frames of the log are already brought to speed. */
export type AlignedHits = {
  readonly logFrames: Float64Array
  readonly targetFrames: Float64Array
  readonly referenceFrames: Float64Array
  readonly weights: Float64Array
}

/** What speaks for one recording at one alignment. */
export type AlignmentEvidence = {
  readonly recording: PlacedRecording
  readonly variant: SpeedVariant
  readonly hits: AlignedHits
  /** Hits expected by chance per frame of the log, and how much more they vary than a Poisson law. */
  readonly backgroundPerFrame: number
  readonly dispersionPerFrame: number
}

/** Follows one recording through the log along one alignment. */
export type Alignment = {
  readonly recording: PlacedRecording
  readonly variant: SpeedVariant
  /** Looks a landmark of the log up on the alignment; call with frames brought to speed, anchors in order. */
  readonly probe: (hash: number, logFrame: number, targetFrame: number) => void
  /** Ends a block of probes covering this many frames and follows the drift. */
  readonly settle: (frames: number) => void
  /** Turns to the blocks before the first one; `false` turns back to the newest. */
  readonly setBackward: (isBackward: boolean) => void
  readonly referenceFrameAt: (logFrame: number) => number
  readonly hitsSince: (logFrame: number) => number
  readonly hitCount: () => number
  readonly expectedHits: (frames: number) => number
  readonly evidence: () => AlignmentEvidence
}

/** Hits lie within this many frames of the line. */
const TOLERANCE_FRAMES = 3
const FIT_HITS = 60
const FIT_FRAMES = 800
const FEWEST_FIT_HITS = 10
const LARGEST_SLOPE_CHANGE = 0.016

type Line = { slope: number; intercept: number }
type HitLists = { log: NumberList; target: NumberList; reference: NumberList; weight: NumberList; line: Line }

function createHitLists(line: Line): HitLists {
  return {
    log: createNumberList(),
    target: createNumberList(),
    reference: createNumberList(),
    weight: createNumberList(),
    line: { ...line },
  }
}

/** Least squares through the newest hits; the slope stays put while they span too little. */
function followDrift({ log, reference, line }: HitLists): void {
  const count = log.length()
  if (count < FEWEST_FIT_HITS) return
  const newest = log.get(count - 1)
  let first = count - 1
  while (first > 0 && count - first < FIT_HITS && Math.abs(newest - log.get(first - 1)) < FIT_FRAMES) first--
  const n = count - first
  let sumLog = 0
  let sumReference = 0
  for (let i = first; i < count; i++) {
    sumLog += log.get(i) - newest
    sumReference += reference.get(i)
  }
  let spread = 0
  let together = 0
  for (let i = first; i < count; i++) {
    const x = log.get(i) - newest - sumLog / n
    spread += x * x
    together += x * (reference.get(i) - sumReference / n)
  }
  const fitted = spread > n * 60 * 60 ? together / spread : line.slope
  line.slope = Math.max(1 - LARGEST_SLOPE_CHANGE, Math.min(1 + LARGEST_SLOPE_CHANGE, fitted))
  line.intercept = sumReference / n - line.slope * (sumLog / n + newest)
}

function merged(backward: HitLists, forward: HitLists): AlignedHits {
  const order: [HitLists, number][] = []
  for (let i = 0; i < backward.log.length(); i++) order.push([backward, i])
  for (let i = 0; i < forward.log.length(); i++) order.push([forward, i])
  order.sort(([a, i], [b, j]) => a.log.get(i) - b.log.get(j))
  return {
    logFrames: Float64Array.from(order, ([list, i]) => list.log.get(i)),
    targetFrames: Float64Array.from(order, ([list, i]) => list.target.get(i)),
    referenceFrames: Float64Array.from(order, ([list, i]) => list.reference.get(i)),
    weights: Float64Array.from(order, ([list, i]) => list.weight.get(i)),
  }
}

/** Starts to follow a recording at an offset (reference frame minus frame of the log brought to speed). */
export function createAlignment(
  recording: PlacedRecording,
  offset: number,
  variant: SpeedVariant,
  totalFrames: number,
): Alignment {
  const { segment, segmentStart, frames: length } = recording
  const forward = createHitLists({ slope: 1, intercept: offset })
  let backward = createHitLists(forward.line)
  let current = forward
  let lastAnchor = -1
  let probedFrames = 0
  const background = new Float64Array(Math.max(16, (length >> OFFSET_BIN_SHIFT) + 1))
  const information = Math.log(Math.max(16, totalFrames))

  const probe = (hash: number, logFrame: number, targetFrame: number): void => {
    const start = startOfHash(segment, hash)
    const end = endOfHash(segment, hash)
    if (start === end) return
    const { positions } = segment
    let slot = firstSlotAt(positions, start, end, segmentStart)
    if (slot === end || positions[slot] >= segmentStart + length) return
    // A common hash tells less: its weight is its information against that of a hash found only once.
    const weight = Math.max(0.2, 1 - Math.log(end - start) / information)
    const predicted = logFrame * current.line.slope + current.line.intercept
    for (; slot < end; slot++) {
      const referenceFrame = positions[slot] - segmentStart
      if (referenceFrame >= length) break
      const residual = referenceFrame - predicted
      if (Math.abs(residual) > TOLERANCE_FRAMES) {
        const wrapped = residual - Math.floor(residual / length) * length
        background[Math.floor(wrapped / 2 ** OFFSET_BIN_SHIFT)] += weight
      } else if (logFrame !== lastAnchor) {
        lastAnchor = logFrame
        current.log.push(logFrame)
        current.target.push(targetFrame)
        current.reference.push(referenceFrame)
        current.weight.push(weight)
      }
    }
  }

  const backgroundPerFrame = () => {
    const pairs = background.map((count, i) => count + background[(i + 1) % background.length])
    const { mean, dispersion } = describeBackground(pairs)
    const frames = Math.max(1, probedFrames)
    return { mean: mean / frames, dispersion: (dispersion - 1) / frames }
  }

  return {
    recording,
    variant,
    probe,
    settle(frames) {
      probedFrames += frames
      followDrift(current)
    },
    setBackward(isBackward) {
      if (isBackward) {
        backward = createHitLists(forward.line)
        // Drift backwards is judged from the hits found so far, nearest last.
        current = backward
      } else current = forward
      lastAnchor = -1
    },
    referenceFrameAt: (logFrame) => logFrame * forward.line.slope + forward.line.intercept,
    hitsSince(logFrame) {
      let count = 0
      for (let i = forward.log.length() - 1; i >= 0 && forward.log.get(i) >= logFrame; i--) count++
      return count
    },
    hitCount: () => forward.log.length() + backward.log.length(),
    expectedHits: (frames) => backgroundPerFrame().mean * frames,
    evidence() {
      const { mean, dispersion } = backgroundPerFrame()
      return {
        recording,
        variant,
        hits: merged(backward, forward),
        backgroundPerFrame: mean,
        dispersionPerFrame: dispersion,
      }
    },
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
  return bestSpan(evidence.hits.logFrames, evidence.backgroundPerFrame)
}
