import { OFFSET_BIN_SHIFT } from './background.ts'
import type { CatalogueIndex } from './catalogue-index.ts'
import { createClaimDesk } from './claim-desk.ts'
import { defaultThresholds, type Detection, type DetectionThresholds } from './detection.ts'
import { engineParameters, SECONDS_PER_FRAME } from './parameters.ts'
import { createPeakStore, type PeakStore } from './peak-store.ts'
import { createPeakPicker } from './peaks.ts'
import { createSpectrumAnalyser } from './spectrum.ts'
import { createDeepSearch, SPEED_VARIANTS, UNCHANGED } from './speed-search.ts'
import { createTracker, LOOK_BACK_BLOCKS, type Tracker } from './tracker.ts'
import { BLOCK_FRAMES } from './block-landmarks.ts'
import { createWindowSearch, WINDOW_BLOCKS } from './window-search.ts'

export type LogAnalyserOptions = {
  readonly index: CatalogueIndex
  readonly thresholds?: DetectionThresholds
  /** A clock in milliseconds, for {@link LogAnalyser.timings}; without one they stay zero. */
  readonly now?: () => number
}

/** Milliseconds spent on spectra and peaks, and on looking them up. */
export type AnalysisTimings = { readonly analyseMs: number; readonly matchMs: number }

/** Finds the recordings of a catalogue in a log that arrives as a stream. Memory does not grow with its length. */
export type LogAnalyser = {
  /** Takes mono samples at engineParameters.sampleRateHz; returns the detections that are final by now. */
  readonly push: (samples: Float32Array) => Detection[]
  /** Ends the log; returns the rest. */
  readonly finish: () => Detection[]
  readonly timings: () => AnalysisTimings
}

const DEEP_SEARCH_BLOCKS = 6
const MOST_DEEP_STARTS = 3
/** Chance candidates per hour of log that are worth following for a while. */
const FOLLOWED_FALSE_ALARMS = 3000
/** Frames of peaks needed beyond a block before its landmarks are complete, at any speed. */
const LOOK_AHEAD_FRAMES = 72

function looksPerHour(blocks: number): number {
  return 3600 / (blocks * BLOCK_FRAMES * SECONDS_PER_FRAME)
}

/** Searches each block of the log as it becomes complete and hands what stands out to the tracker. */
function createSearches(index: CatalogueIndex, peaks: PeakStore, tracker: Tracker) {
  const windowSearch = createWindowSearch(index)
  const deepSearch = createDeepSearch(index)
  const offsets = index.totalFrames >> OFFSET_BIN_SHIFT
  const isWorthFollowing = (logChance: number, looks: number): boolean =>
    Math.exp(logChance) * offsets * looks <= FOLLOWED_FALSE_ALARMS

  const isExplained = (fromBlock: number, toBlock: number): boolean =>
    tracker.isExplained(fromBlock * BLOCK_FRAMES, toBlock * BLOCK_FRAMES)

  return {
    searchWindow(block: number): void {
      const isDense = !isExplained(block - 2, block)
      for (const candidate of windowSearch(peaks, block, isDense)) {
        if (!isWorthFollowing(candidate.logChance, looksPerHour(1))) break
        tracker.start(candidate, UNCHANGED, Math.max(0, block - WINDOW_BLOCKS + 1), block)
      }
    },
    searchDeep(block: number): void {
      const fromBlock = block + 1 - DEEP_SEARCH_BLOCKS
      if (fromBlock < 0 || isExplained(fromBlock, block)) return
      const found = deepSearch(peaks, fromBlock * BLOCK_FRAMES, (block + 1) * BLOCK_FRAMES)
      for (const candidate of found.slice(0, MOST_DEEP_STARTS)) {
        if (!isWorthFollowing(candidate.logChance, looksPerHour(DEEP_SEARCH_BLOCKS) * SPEED_VARIANTS.length))
          break
        tracker.start(candidate, candidate.variant, fromBlock, block)
      }
    },
  }
}

/** Starts the analysis of one log against the index as it is now. */
export function createLogAnalyser(options: LogAnalyserOptions): LogAnalyser {
  const { index, thresholds = defaultThresholds, now = () => 0 } = options
  const peaks = createPeakStore()
  const picker = createPeakPicker(peaks.add)
  const spectrum = createSpectrumAnalyser(engineParameters.frameSamples, engineParameters.hopSamples)
  const tracker = createTracker(index, peaks)
  const searches = createSearches(index, peaks, tracker)
  const desk = createClaimDesk(index, thresholds)
  let block = 0
  let sampleCount = 0
  let analyseMs = 0
  let matchMs = 0

  const workThroughBlock = (): Detection[] => {
    searches.searchWindow(block)
    if (block % DEEP_SEARCH_BLOCKS === DEEP_SEARCH_BLOCKS - 1) searches.searchDeep(block)
    desk.take(tracker.advance(block))
    block++
    peaks.dropBefore((block - LOOK_BACK_BLOCKS - DEEP_SEARCH_BLOCKS) * BLOCK_FRAMES)
    const open = Math.min(tracker.earliestFrame() ?? Infinity, block * BLOCK_FRAMES)
    return desk.settle(open, sampleCount / engineParameters.sampleRateHz)
  }

  const workThroughUntil = (frame: number): Detection[] => {
    const detections: Detection[] = []
    while ((block + 1) * BLOCK_FRAMES + LOOK_AHEAD_FRAMES <= frame) detections.push(...workThroughBlock())
    return detections
  }

  const timed = (analyse: () => void, match: () => Detection[]): Detection[] => {
    const start = now()
    analyse()
    const analysed = now()
    const detections = match()
    analyseMs += analysed - start
    matchMs += now() - analysed
    return detections
  }

  return {
    push(samples) {
      sampleCount += samples.length
      return timed(
        () => spectrum.push(samples, picker.push),
        () => workThroughUntil(picker.completeFrames()),
      )
    },
    finish() {
      const completePeaks = (): void => {
        spectrum.finish(picker.push)
        picker.finish()
      }
      return timed(completePeaks, () => {
        const last = picker.completeFrames()
        const detections = workThroughUntil(last)
        while (block * BLOCK_FRAMES < last) detections.push(...workThroughBlock())
        desk.take(tracker.finish())
        return [...detections, ...desk.settle(Infinity, sampleCount / engineParameters.sampleRateHz)]
      })
    },
    timings: () => ({ analyseMs, matchMs }),
  }
}
