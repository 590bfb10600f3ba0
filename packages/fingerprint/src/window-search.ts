import type { CatalogueIndex } from './catalogue-index.ts'
import { pairPeaks, type PairingOptions } from './landmarks.ts'
import { createOffsetHistogram, type Candidate } from './offset-histogram.ts'
import { HASH_BITS } from './parameters.ts'
import type { PeakStore } from './peak-store.ts'
import { UNCHANGED } from './speed-search.ts'
import { BLOCK_FRAMES } from './block-landmarks.ts'

/** Blocks whose landmarks are counted together: ten seconds. */
export const WINDOW_BLOCKS = 5

const SPARSE_PAIRING: PairingOptions = { ...UNCHANGED, maximumRank: 1, fanOut: 8, boundaryMargin: 0 }
/** More peaks, pairs and neighbouring hashes: finds weak music, for six times the look-ups. */
const DENSE_PAIRING: PairingOptions = { ...UNCHANGED, maximumRank: 2, fanOut: 12, boundaryMargin: 0.12 }

/** Adds a block to the sliding window and returns what stands out in it, least likely by chance first. */
export type WindowSearch = (peaks: PeakStore, block: number, isDense: boolean) => Candidate[]

export function createWindowSearch(index: CatalogueIndex): WindowSearch {
  const histogram = createOffsetHistogram(index)
  const lastSeen = new Int32Array(2 ** HASH_BITS).fill(-WINDOW_BLOCKS * BLOCK_FRAMES)

  return (peaks, block, isDense) => {
    histogram.nextBlock(WINDOW_BLOCKS)
    const from = block * BLOCK_FRAMES
    pairPeaks(peaks, from, from + BLOCK_FRAMES, isDense ? DENSE_PAIRING : SPARSE_PAIRING, (hash, frame) => {
      // A held tone or a loop says the same thing again: each landmark speaks once a window.
      if (frame - lastSeen[hash] < WINDOW_BLOCKS * BLOCK_FRAMES) return
      lastSeen[hash] = frame
      histogram.add(hash, frame)
    })
    return histogram.candidates()
  }
}
