import { createAlignment, type Alignment, type AlignmentEvidence, type SpeedVariant } from './alignment.ts'
import type { CatalogueIndex } from './catalogue-index.ts'
import { pairPeaks } from './landmarks.ts'
import type { Candidate } from './offset-histogram.ts'
import type { PeakStore } from './peak-store.ts'

/** Frames of a block, the step in which a log is worked through: about two seconds. */
export const BLOCK_FRAMES = 64
/** An alignment just begun looks back this far for its true start, as long as hits come. */
export const LOOK_BACK_BLOCKS = 50
const EMPTY_BLOCKS_BACK = 8
/** How long an alignment may find nothing before it ends: speech may cover music for a while. */
const PATIENCE_FRAMES = 800
const PATIENCE_FRAMES_WEAK = 320
const WEAK_HITS = 40
const MOST_ALIGNMENTS = 48
const SAME_OFFSET_FRAMES = 8

/** Keeps the alignments that are running at this moment of the log. */
export type Tracker = {
  /** Follows a candidate found in the blocks [fromBlock, toBlock), unless it is followed already. */
  readonly start: (candidate: Candidate, variant: SpeedVariant, fromBlock: number, toBlock: number) => void
  /** Looks the landmarks of a block up on every running alignment; returns those that ended. */
  readonly advance: (block: number) => AlignmentEvidence[]
  readonly finish: () => AlignmentEvidence[]
  /** Whether a strong alignment explains most of the frames from this one on. */
  readonly isExplained: (fromFrame: number, toFrame: number) => boolean
  /** First frame of the log (as recorded) any running alignment may claim, or null when none runs. */
  readonly earliestFrame: () => number | null
}

type Running = { readonly alignment: Alignment; firstFrame: number }

/** Landmarks of the log are made anew for each speed, from the peaks in the store. */
export function createTracker(index: CatalogueIndex, peaks: PeakStore): Tracker {
  let running: Running[] = []
  const totalFrames = index.totalFrames

  const probeBlock = ({ alignment }: Running, block: number): void => {
    const { variant } = alignment
    const options = { ...variant, maximumRank: 2, fanOut: 12, boundaryMargin: 0.15 }
    pairPeaks(peaks, block * BLOCK_FRAMES, (block + 1) * BLOCK_FRAMES, options, alignment.probe)
    alignment.settle(BLOCK_FRAMES * variant.speedRatio)
  }

  const lookBack = (track: Running, fromBlock: number): void => {
    const { alignment } = track
    alignment.setBackward(true)
    let empty = 0
    const last = Math.max(0, fromBlock - LOOK_BACK_BLOCKS)
    for (let block = fromBlock - 1; block >= last && empty < EMPTY_BLOCKS_BACK; block--) {
      const before = alignment.hitCount()
      probeBlock(track, block)
      const chance = alignment.expectedHits(BLOCK_FRAMES)
      if (alignment.hitCount() - before > 1 + 3 * chance) {
        empty = 0
        track.firstFrame = block * BLOCK_FRAMES
      } else empty++
    }
    alignment.setBackward(false)
  }

  const isFollowed = (candidate: Candidate, variant: SpeedVariant, frame: number): boolean =>
    running.some(({ alignment }) => {
      if (alignment.recording.recordingNumber !== candidate.recording.recordingNumber) return false
      const expected = alignment.referenceFrameAt(frame * alignment.variant.speedRatio)
      const offered = candidate.offset - candidate.recording.start + frame * variant.speedRatio
      return Math.abs(expected - offered) <= SAME_OFFSET_FRAMES
    })

  const hasEnded = ({ alignment }: Running, frame: number): boolean => {
    const scaled = frame * alignment.variant.speedRatio
    if (alignment.referenceFrameAt(scaled) > alignment.recording.frames) return true
    const patience = alignment.hitCount() < WEAK_HITS ? PATIENCE_FRAMES_WEAK : PATIENCE_FRAMES
    return alignment.hitsSince(scaled - patience) <= 2 + 2 * alignment.expectedHits(patience)
  }

  const weakest = (): Running | undefined =>
    running.reduce<Running | undefined>(
      (least, track) => (!least || track.alignment.hitCount() < least.alignment.hitCount() ? track : least),
      undefined,
    )

  return {
    start(candidate, variant, fromBlock, toBlock) {
      if (isFollowed(candidate, variant, toBlock * BLOCK_FRAMES)) return
      const { recording } = candidate
      const alignment = createAlignment(recording, candidate.offset - recording.start, variant, totalFrames)
      const track: Running = { alignment, firstFrame: fromBlock * BLOCK_FRAMES }
      for (let block = fromBlock; block < toBlock; block++) probeBlock(track, block)
      lookBack(track, fromBlock)
      running.push(track)
      if (running.length > MOST_ALIGNMENTS) {
        const dropped = weakest()
        running = running.filter((other) => other !== dropped)
      }
    },
    advance(block) {
      for (const track of running) probeBlock(track, block)
      const frame = (block + 1) * BLOCK_FRAMES
      const ended = running.filter((track) => hasEnded(track, frame))
      running = running.filter((track) => !ended.includes(track))
      return ended.map(({ alignment }) => alignment.evidence())
    },
    finish() {
      const ended = running
      running = []
      return ended.map(({ alignment }) => alignment.evidence())
    },
    isExplained: (fromFrame, toFrame) =>
      running.some(({ alignment }) => {
        const ratio = alignment.variant.speedRatio
        const hits = alignment.hitsSince(fromFrame * ratio)
        const frames = toFrame - fromFrame
        return hits >= 25 && hits > 4 * alignment.expectedHits(frames)
      }),
    earliestFrame: () =>
      running.length === 0 ? null : Math.min(...running.map(({ firstFrame }) => firstFrame)),
  }
}
