import type { AlignmentEvidence } from './alignment.ts'
import type { CatalogueIndex } from './catalogue-index.ts'
import {
  defaultThresholds,
  describeClaim,
  logFalseAlarms,
  strongestClaim,
  type Claim,
  type Detection,
  type DetectionThresholds,
} from './detection.ts'
import { pairPeaks, type PairingOptions } from './landmarks.ts'
import { createOffsetHistogram, OFFSET_BIN_SHIFT } from './offset-histogram.ts'
import { engineParameters, HASH_BITS, SECONDS_PER_FRAME } from './parameters.ts'
import { createPeakStore } from './peak-store.ts'
import { createPeakPicker } from './peaks.ts'
import { resolveClaims, type Explained } from './resolve.ts'
import { createSpectrumAnalyser } from './spectrum.ts'
import { createDeepSearch, SPEED_VARIANTS, UNCHANGED } from './speed-search.ts'
import { BLOCK_FRAMES, createTracker, LOOK_BACK_BLOCKS } from './tracker.ts'

export type LogAnalyserOptions = {
  readonly index: CatalogueIndex
  readonly thresholds?: DetectionThresholds
}

/** Finds the recordings of a catalogue in a log that arrives as a stream. Memory does not grow with its length. */
export type LogAnalyser = {
  /** Takes mono samples at engineParameters.sampleRateHz; returns the detections that are final by now. */
  readonly push: (samples: Float32Array) => Detection[]
  /** Ends the log; returns the rest. */
  readonly finish: () => Detection[]
}

/** Blocks in which the landmarks of the running search are counted together: ten seconds. */
const WINDOW_BLOCKS = 5
const DEEP_SEARCH_BLOCKS = 6
const SEARCH_PAIRING: PairingOptions = {
  ...UNCHANGED,
  maximumRank: 1,
  fanOut: 8,
  boundaryMargin: 0,
}
/** Chance candidates per hour of log that are worth following for a while. */
const FOLLOWED_FALSE_ALARMS = 1000
const MOST_DEEP_STARTS = 3
/** Frames of peaks needed beyond a block before its landmarks are complete, at any speed. */
const LOOK_AHEAD_FRAMES = 72
/** Final stretches are remembered this long against echoes found late. */
const MEMORY_FRAMES = (LOOK_BACK_BLOCKS + 20) * BLOCK_FRAMES

/** Starts the analysis of one log against the index as it is now. */
export function createLogAnalyser(options: LogAnalyserOptions): LogAnalyser {
  const { index, thresholds = defaultThresholds } = options
  const peaks = createPeakStore()
  const picker = createPeakPicker(peaks.add)
  const spectrum = createSpectrumAnalyser(engineParameters.frameSamples, engineParameters.hopSamples)
  const onRow = (power: Float32Array): void => picker.push(power)
  const histogram = createOffsetHistogram(index)
  const deepSearch = createDeepSearch(index)
  const tracker = createTracker(index, peaks)
  const lastSeen = new Int32Array(2 ** HASH_BITS).fill(-1_000_000)
  const offsets = index.totalFrames >> OFFSET_BIN_SHIFT
  let waiting: Claim[] = []
  let explained: Explained[] = []
  let block = 0
  let sampleCount = 0

  const falseAlarmsOf = (claim: Claim): number => {
    const speeds = claim.evidence.variant.speedRatio === 1 ? 1 : SPEED_VARIANTS.length
    return Math.exp(logFalseAlarms(claim.logChance, index.totalFrames, speeds))
  }
  const isSignificant = (claim: Claim): boolean =>
    falseAlarmsOf(claim) <= thresholds.reviewFalseAlarms &&
    (claim.endFrame - claim.startFrame) * SECONDS_PER_FRAME >= thresholds.shortestSeconds

  const take = (ended: readonly AlignmentEvidence[]): void => {
    for (const evidence of ended) {
      const claim = strongestClaim(evidence)
      if (claim && isSignificant(claim)) waiting.push(claim)
    }
  }

  /** Settles the claims that nothing still running can overlap. */
  const settle = (openFrom: number): Detection[] => {
    if (waiting.length === 0) return []
    const end = waiting.reduce((latest, claim) => Math.max(latest, claim.endFrame), 0)
    if (end >= openFrom) return []
    const standing = resolveClaims(waiting, explained, isSignificant)
    waiting = []
    for (const { evidence, startFrame, endFrame } of standing) {
      explained.push({ recordingNumber: evidence.recording.recordingNumber, startFrame, endFrame })
    }
    explained = explained.filter(({ endFrame }) => endFrame > block * BLOCK_FRAMES - MEMORY_FRAMES)
    return standing.map((claim) => {
      const falseAlarms = falseAlarmsOf(claim)
      const decision = falseAlarms <= thresholds.acceptFalseAlarms ? 'accept' : 'review'
      return describeClaim(claim, falseAlarms, decision, sampleCount / engineParameters.sampleRateHz)
    })
  }

  const searchWindow = (): void => {
    histogram.nextBlock(WINDOW_BLOCKS)
    const from = block * BLOCK_FRAMES
    pairPeaks(peaks, from, from + BLOCK_FRAMES, SEARCH_PAIRING, (hash, frame) => {
      // A held tone or a loop says the same thing again: each landmark speaks once a window.
      if (frame - lastSeen[hash] < WINDOW_BLOCKS * BLOCK_FRAMES) return
      lastSeen[hash] = frame
      histogram.add(hash, frame)
    })
    for (const candidate of histogram.candidates(1)) {
      const perHour = Math.exp(candidate.logChance) * offsets * (3600 / (BLOCK_FRAMES * SECONDS_PER_FRAME))
      if (perHour > FOLLOWED_FALSE_ALARMS) break
      tracker.start(candidate, UNCHANGED, Math.max(0, block - WINDOW_BLOCKS + 1), block)
    }
  }

  const searchDeep = (): void => {
    const fromBlock = block + 1 - DEEP_SEARCH_BLOCKS
    const from = fromBlock * BLOCK_FRAMES
    const to = (block + 1) * BLOCK_FRAMES
    if (fromBlock < 0 || tracker.isExplained(from, to)) return
    const looksPerHour = 3600 / (DEEP_SEARCH_BLOCKS * BLOCK_FRAMES * SECONDS_PER_FRAME)
    for (const candidate of deepSearch(peaks, from, to).slice(0, MOST_DEEP_STARTS)) {
      const perHour = Math.exp(candidate.logChance) * offsets * looksPerHour * SPEED_VARIANTS.length
      if (perHour > FOLLOWED_FALSE_ALARMS) break
      tracker.start(candidate, candidate.variant, fromBlock, block)
    }
  }

  const workThroughBlock = (): Detection[] => {
    searchWindow()
    if (block % DEEP_SEARCH_BLOCKS === DEEP_SEARCH_BLOCKS - 1) searchDeep()
    take(tracker.advance(block))
    block++
    peaks.dropBefore((block - LOOK_BACK_BLOCKS - DEEP_SEARCH_BLOCKS) * BLOCK_FRAMES)
    return settle(tracker.earliestFrame() ?? block * BLOCK_FRAMES)
  }

  const workThroughUntil = (frame: number): Detection[] => {
    const detections: Detection[] = []
    while ((block + 1) * BLOCK_FRAMES + LOOK_AHEAD_FRAMES <= frame) detections.push(...workThroughBlock())
    return detections
  }

  return {
    push(samples) {
      sampleCount += samples.length
      spectrum.push(samples, onRow)
      return workThroughUntil(picker.completeFrames())
    },
    finish() {
      spectrum.finish(onRow)
      picker.finish()
      const last = picker.completeFrames()
      const detections = workThroughUntil(last)
      while (block * BLOCK_FRAMES < last) detections.push(...workThroughBlock())
      take(tracker.finish())
      detections.push(...settle(Infinity))
      return detections
    },
  }
}
