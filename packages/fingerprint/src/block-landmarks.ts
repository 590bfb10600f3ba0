import { createNumberList } from './growable.ts'
import { endOfHash, startOfHash, type IndexSegment } from './index-segment.ts'
import { pairPeaks } from './landmarks.ts'
import type { PeakStore } from './peak-store.ts'

/** How the sound of the log was changed against the reference; times of the log are multiplied by the ratio. */
export type SpeedVariant = { readonly speedRatio: number; readonly pitchFollowsSpeed: boolean }

/** Frames of a block, the step in which a log is worked through: about two seconds. */
export const BLOCK_FRAMES = 64

/** The landmarks of a block that occur in a segment at all, with the slots they have there. */
export type BlockLandmarks = {
  readonly anchorFrames: Float64Array
  readonly targetFrames: Float64Array
  readonly firstSlots: Uint32Array
  readonly endSlots: Uint32Array
}

/** Makes the landmarks of blocks at any speed, once for all the alignments that need them. */
export type BlockLandmarkSource = {
  readonly of: (block: number, variant: SpeedVariant, segment: IndexSegment) => BlockLandmarks
  readonly dropBefore: (block: number) => void
}

type Kept = {
  readonly variant: SpeedVariant
  readonly segment: IndexSegment
  readonly landmarks: BlockLandmarks
}

function build(
  peaks: PeakStore,
  block: number,
  variant: SpeedVariant,
  segment: IndexSegment,
): BlockLandmarks {
  const anchors = createNumberList(2048)
  const targets = createNumberList(2048)
  const first = createNumberList(2048)
  const end = createNumberList(2048)
  const options = { ...variant, maximumRank: 2, fanOut: 12, boundaryMargin: 0.15 }
  pairPeaks(peaks, block * BLOCK_FRAMES, (block + 1) * BLOCK_FRAMES, options, (hash, anchor, target) => {
    const start = startOfHash(segment, hash)
    const stop = endOfHash(segment, hash)
    if (start === stop) return
    anchors.push(anchor)
    targets.push(target)
    first.push(start)
    end.push(stop)
  })
  return {
    anchorFrames: anchors.toArray(),
    targetFrames: targets.toArray(),
    firstSlots: Uint32Array.from(first.toArray()),
    endSlots: Uint32Array.from(end.toArray()),
  }
}

/** Keeps what was made until told to drop it. */
export function createBlockLandmarkSource(peaks: PeakStore): BlockLandmarkSource {
  const kept = new Map<number, Kept[]>()
  return {
    of(block, variant, segment) {
      const known = kept.get(block) ?? []
      const found = known.find(
        (other) =>
          other.segment === segment &&
          other.variant.speedRatio === variant.speedRatio &&
          other.variant.pitchFollowsSpeed === variant.pitchFollowsSpeed,
      )
      if (found) return found.landmarks
      const landmarks = build(peaks, block, variant, segment)
      kept.set(block, [...known, { variant, segment, landmarks }])
      return landmarks
    },
    dropBefore(block) {
      for (const key of kept.keys()) if (key < block) kept.delete(key)
    },
  }
}
