import type { SpeedVariant } from './block-landmarks.ts'
import type { CatalogueIndex } from './catalogue-index.ts'
import { pairPeaks } from './landmarks.ts'
import { createOffsetHistogram, type Candidate, type OffsetHistogram } from './offset-histogram.ts'
import { HASH_BITS } from './parameters.ts'
import type { PeakStore } from './peak-store.ts'

/** A candidate with the change of speed at which it was found. */
export type SpeedCandidate = Candidate & { readonly variant: SpeedVariant }

export const UNCHANGED: SpeedVariant = { speedRatio: 1, pitchFollowsSpeed: false }

function variants(): SpeedVariant[] {
  const list: SpeedVariant[] = [UNCHANGED]
  for (let step = 2; step <= 9; step++) {
    for (const sign of [1, -1]) list.push({ speedRatio: 1 + (sign * step) / 200, pitchFollowsSpeed: true })
  }
  for (const percent of [1, 2, 3, 4]) {
    for (const sign of [1, -1])
      list.push({ speedRatio: 1 + (sign * percent) / 100, pitchFollowsSpeed: false })
  }
  return list
}

/** Every change of speed that is tried: a turntable's or a tape's (pitch follows), and a change of tempo alone. */
export const SPEED_VARIANTS: readonly SpeedVariant[] = variants()

/** Looks through a stretch of the log at every speed and with more peaks than the running search; costly. */
export type DeepSearch = (peaks: PeakStore, fromFrame: number, toFrame: number) => SpeedCandidate[]

function fill(
  histogram: OffsetHistogram,
  seen: Int32Array,
  mark: number,
  peaks: PeakStore,
  range: readonly [number, number],
  variant: SpeedVariant,
): void {
  const isPlain = variant.speedRatio === 1
  const options = { ...variant, maximumRank: isPlain ? 2 : 1, fanOut: isPlain ? 16 : 8, boundaryMargin: 0.15 }
  pairPeaks(peaks, range[0], range[1], options, (hash, frame) => {
    if (seen[hash] === mark) return
    seen[hash] = mark
    histogram.add(hash, frame)
  })
}

/** Prepares the deep search of one log against the index as it is now. */
export function createDeepSearch(index: CatalogueIndex): DeepSearch {
  const histogram = createOffsetHistogram(index)
  const seen = new Int32Array(2 ** HASH_BITS)
  let mark = 0

  return (peaks, fromFrame, toFrame) => {
    const best = new Map<number, SpeedCandidate>()
    for (const variant of SPEED_VARIANTS) {
      mark++
      histogram.nextBlock(1)
      fill(histogram, seen, mark, peaks, [fromFrame, toFrame], variant)
      for (const candidate of histogram.candidates()) {
        const known = best.get(candidate.recording.recordingNumber)
        if (!known || candidate.logChance < known.logChance) {
          best.set(candidate.recording.recordingNumber, { ...candidate, variant })
        }
      }
    }
    return [...best.values()].sort((a, b) => a.logChance - b.logChance)
  }
}
