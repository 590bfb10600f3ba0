import { createAlignment, logChanceOf, spanOf, type Alignment, type AlignmentEvidence } from './alignment.ts'
import type { CatalogueIndex } from './catalogue-index.ts'
import {
  BLOCK_FRAMES,
  createBlockLandmarkSource,
  type BlockLandmarkSource,
  type SpeedVariant,
} from './block-landmarks.ts'
import { logFalseAlarms } from './detection.ts'
import type { Candidate } from './offset-histogram.ts'
import type { PeakStore } from './peak-store.ts'
import { SPEED_VARIANTS } from './speed-search.ts'

/** An alignment just begun looks back this far for its true start, as long as hits come. */
export const LOOK_BACK_BLOCKS = 50
const EMPTY_BLOCKS_BACK = 10
/** How long an alignment may find nothing before it ends: speech may cover music for a while. */
const PATIENCE_FRAMES = 800
const PATIENCE_FRAMES_WEAK = 320
const WEAK_HITS = 40
const MOST_ALIGNMENTS = 24
/** False alarms per hour of log, as strong as a candidate after a closer look, that are worth following. */
const PROMISING_FALSE_ALARMS = 3000
/** A candidate that was not borne out is not looked at again for this long, unless its hits grew by this factor. */
const REJECTED_BLOCKS = 3
const SECOND_LOOK_GROWTH = 1.25
/** Candidates this close in offset and speed are the same alignment. */
const SAME_OFFSET_FRAMES = 8
const SAME_SPEED = 0.006
/** A stretch is explained by an alignment with this many hits a frame, four times chance, and no drift of speed. */
const STRONG_HITS_PER_FRAME = 0.15
const STRONG_DRIFT = 0.004

/** Keeps the alignments that are running at this moment of the log. */
export type Tracker = {
  /** Follows a candidate found in the blocks [fromBlock, toBlock), unless it is followed already. */
  readonly start: (candidate: Candidate, variant: SpeedVariant, fromBlock: number, toBlock: number) => void
  /** Looks the landmarks of a block up on every running alignment; returns those that ended. */
  readonly advance: (block: number) => AlignmentEvidence[]
  readonly finish: () => AlignmentEvidence[]
  /** Whether a strong alignment explains these newest frames. */
  readonly isExplained: (fromFrame: number, toFrame: number) => boolean
  /** First frame of the log any running alignment may claim, or null when none runs. */
  readonly earliestFrame: () => number | null
}

type Rejected = { readonly candidate: Candidate; readonly block: number }
type Running = { readonly alignment: Alignment; firstFrame: number }

function probeBlock(source: BlockLandmarkSource, alignment: Alignment, block: number): void {
  alignment.probe(source.of(block, alignment.variant, alignment.recording.segment))
}

/** Follows an alignment back from the blocks in which it was found; returns the first frame that may belong to it. */
function lookBack(source: BlockLandmarkSource, alignment: Alignment, fromBlock: number): number {
  alignment.setBackward(true)
  let firstBlock = fromBlock
  const last = Math.max(0, fromBlock - LOOK_BACK_BLOCKS)
  for (let block = fromBlock - 1; block >= last && firstBlock - block <= EMPTY_BLOCKS_BACK; block--) {
    const before = alignment.hitCount()
    probeBlock(source, alignment, block)
    const chance = alignment.expectedHits(BLOCK_FRAMES * alignment.variant.speedRatio)
    if (alignment.hitCount() - before > 1 + 3 * chance) firstBlock = block
  }
  alignment.setBackward(false)
  return firstBlock * BLOCK_FRAMES
}

function isSameAlignment(
  alignment: Alignment,
  candidate: Candidate,
  variant: SpeedVariant,
  frame: number,
): boolean {
  if (alignment.recording.recordingNumber !== candidate.recording.recordingNumber) return false
  if (Math.abs(alignment.variant.speedRatio - variant.speedRatio) > SAME_SPEED) return false
  if (alignment.variant.pitchFollowsSpeed !== variant.pitchFollowsSpeed) return false
  const expected = alignment.referenceFrameAt(frame * alignment.variant.speedRatio)
  const offered = candidate.offset - candidate.recording.start + frame * variant.speedRatio
  return Math.abs(expected - offered) <= SAME_OFFSET_FRAMES
}

function hasEnded(alignment: Alignment, frame: number): boolean {
  const scaled = frame * alignment.variant.speedRatio
  if (alignment.referenceFrameAt(scaled) > alignment.recording.frames) return true
  const patience = alignment.hitCount() < WEAK_HITS ? PATIENCE_FRAMES_WEAK : PATIENCE_FRAMES
  return alignment.hitsSince(scaled - patience) <= 2 + 2 * alignment.expectedHits(patience)
}

/** Whether the landmarks around the first window bear the candidate out, as far as following it is worth while. */
function isPromising(alignment: Alignment, totalFrames: number): boolean {
  const evidence = alignment.evidence()
  const span = spanOf(evidence)
  return (
    span !== null &&
    logFalseAlarms(logChanceOf(evidence, span), totalFrames, SPEED_VARIANTS.length) <=
      Math.log(PROMISING_FALSE_ALARMS)
  )
}

function weakest(running: readonly Running[]): Running {
  return running.reduce((least, track) =>
    track.alignment.hitCount() < least.alignment.hitCount() ? track : least,
  )
}

function explains(alignment: Alignment, fromFrame: number, toFrame: number): boolean {
  const ratio = alignment.variant.speedRatio
  const hits = alignment.hitsSince(fromFrame * ratio)
  const frames = (toFrame - fromFrame) * ratio
  return (
    hits >= STRONG_HITS_PER_FRAME * frames &&
    hits > 4 * alignment.expectedHits(frames) &&
    alignment.drift() < STRONG_DRIFT
  )
}

/** Landmarks of the log are made anew for each alignment's speed, from the peaks in the store. */
export function createTracker(index: CatalogueIndex, peaks: PeakStore): Tracker {
  const { totalFrames } = index
  const source = createBlockLandmarkSource(peaks)
  const rejected: Rejected[] = []
  let running: Running[] = []

  const isRejected = (candidate: Candidate, block: number): boolean => {
    while (rejected.length > 0 && rejected[0].block < block - REJECTED_BLOCKS) rejected.shift()
    return rejected.some(
      ({ candidate: { recording, offset, hits } }) =>
        recording.recordingNumber === candidate.recording.recordingNumber &&
        Math.abs(offset - candidate.offset) <= SAME_OFFSET_FRAMES &&
        candidate.hits < SECOND_LOOK_GROWTH * hits,
    )
  }

  return {
    start(candidate, variant, fromBlock, toBlock) {
      const frame = toBlock * BLOCK_FRAMES
      if (running.some(({ alignment }) => isSameAlignment(alignment, candidate, variant, frame))) return
      const { recording } = candidate
      const alignment = createAlignment(recording, candidate.offset - recording.start, variant, totalFrames)
      if (isRejected(candidate, toBlock)) return
      for (let block = fromBlock; block < toBlock; block++) probeBlock(source, alignment, block)
      if (!isPromising(alignment, totalFrames)) {
        rejected.push({ candidate, block: toBlock })
        return
      }
      running.push({ alignment, firstFrame: lookBack(source, alignment, fromBlock) })
      if (running.length > MOST_ALIGNMENTS) {
        const dropped = weakest(running)
        running = running.filter((track) => track !== dropped)
      }
    },
    advance(block) {
      source.dropBefore(block - LOOK_BACK_BLOCKS - 8)
      for (const { alignment } of running) probeBlock(source, alignment, block)
      const frame = (block + 1) * BLOCK_FRAMES
      const ended = running.filter(({ alignment }) => hasEnded(alignment, frame))
      running = running.filter((track) => !ended.includes(track))
      return ended.map(({ alignment }) => alignment.evidence())
    },
    finish() {
      const ended = running
      running = []
      return ended.map(({ alignment }) => alignment.evidence())
    },
    isExplained: (fromFrame, toFrame) =>
      running.some(({ alignment }) => explains(alignment, fromFrame, toFrame)),
    earliestFrame: () =>
      running.length === 0 ? null : Math.min(...running.map(({ firstFrame }) => firstFrame)),
  }
}
