import { createNumberList } from './growable.ts'

/** Landmarks of the log that lie on an alignment, in order of time; frames of the log are those of the recording. */
export type AlignedHits = {
  readonly logFrames: Float64Array
  readonly targetFrames: Float64Array
  readonly referenceFrames: Float64Array
  readonly weights: Float64Array
}

/** The straight line from frames of the log (brought to speed) to frames of the reference. */
export type Line = { slope: number; intercept: number }

/** Hits as they come, and the line that follows them. */
export type HitCollector = {
  readonly line: Line
  readonly add: (logFrame: number, targetFrame: number, referenceFrame: number, weight: number) => void
  readonly count: () => number
  readonly countSince: (logFrame: number) => number
  /** Bends the line to the newest hits. */
  readonly followDrift: () => void
  readonly hits: (speedRatio: number) => AlignedHits
}

const FIT_HITS = 60
const FIT_FRAMES = 800
const FEWEST_FIT_HITS = 10
/** Spread of the hits (standard deviation, frames) below which a slope would be noise. */
const FIT_SPREAD_FRAMES = 60
const LARGEST_SLOPE_CHANGE = 0.016

/** Collects hits around a line; backwards in time is as good as forwards. */
export function createHitCollector(start: Line): HitCollector {
  const log = createNumberList()
  const target = createNumberList()
  const reference = createNumberList()
  const weight = createNumberList()
  const line = { ...start }

  const followDrift = (): void => {
    const count = log.length()
    if (count < FEWEST_FIT_HITS) return
    const newest = log.get(count - 1)
    let first = count - 1
    while (first > 0 && count - first < FIT_HITS && Math.abs(newest - log.get(first - 1)) < FIT_FRAMES)
      first--
    const n = count - first
    let meanLog = 0
    let meanReference = 0
    for (let i = first; i < count; i++) {
      meanLog += (log.get(i) - newest) / n
      meanReference += reference.get(i) / n
    }
    let spread = 0
    let together = 0
    for (let i = first; i < count; i++) {
      const x = log.get(i) - newest - meanLog
      spread += x * x
      together += x * (reference.get(i) - meanReference)
    }
    const fitted = spread > n * FIT_SPREAD_FRAMES ** 2 ? together / spread : line.slope
    line.slope = Math.max(1 - LARGEST_SLOPE_CHANGE, Math.min(1 + LARGEST_SLOPE_CHANGE, fitted))
    line.intercept = meanReference - line.slope * (meanLog + newest)
  }

  return {
    line,
    add(logFrame, targetFrame, referenceFrame, itsWeight) {
      log.push(logFrame)
      target.push(targetFrame)
      reference.push(referenceFrame)
      weight.push(itsWeight)
    },
    count: log.length,
    countSince(logFrame) {
      let count = 0
      for (let i = log.length() - 1; i >= 0 && log.get(i) >= logFrame; i--) count++
      return count
    },
    followDrift,
    hits: (speedRatio) => ({
      logFrames: Float64Array.from({ length: log.length() }, (_, i) => log.get(i) / speedRatio),
      targetFrames: Float64Array.from({ length: log.length() }, (_, i) => target.get(i) / speedRatio),
      referenceFrames: Float64Array.from({ length: log.length() }, (_, i) => reference.get(i)),
      weights: Float64Array.from({ length: log.length() }, (_, i) => weight.get(i)),
    }),
  }
}

/** All hits of several lists in order of time. */
export function mergeHits(lists: readonly AlignedHits[]): AlignedHits {
  const order = lists.flatMap((list) => Array.from(list.logFrames, (logFrame, i) => ({ list, logFrame, i })))
  order.sort((a, b) => a.logFrame - b.logFrame || a.i - b.i)
  return {
    logFrames: Float64Array.from(order, ({ logFrame }) => logFrame),
    targetFrames: Float64Array.from(order, ({ list, i }) => list.targetFrames[i]),
    referenceFrames: Float64Array.from(order, ({ list, i }) => list.referenceFrames[i]),
    weights: Float64Array.from(order, ({ list, i }) => list.weights[i]),
  }
}
