import { describeBackground, OFFSET_BIN_FRAMES, OFFSET_BIN_SHIFT, type BackgroundLaw } from './background.ts'
import type { CatalogueIndex, PlacedRecording } from './catalogue-index.ts'
import { createHitBlocks, type HitBlock } from './hit-blocks.ts'
import { endOfHash, startOfHash } from './index-segment.ts'
import { logOverdispersedTail, logPoissonTail } from './statistics.ts'

/** A hash with more landmarks than this share of the catalogue says nothing and costs most. */
const COMMON_HASH_SHARE = 1 / 20_000
const COMMON_HASH_FLOOR = 64
const MOST_CANDIDATES = 24
/** Candidates expected by pure chance in one look at the histogram. */
const CHANCE_CANDIDATES = 20
const FEWEST_HITS = 4
const NEAR_BINS = 3

/** A recording and offset at which more landmarks agree than chance explains. */
export type Candidate = {
  readonly recording: PlacedRecording
  /** Position on the whole axis minus frame of the log, at the middle of the bin. */
  readonly offset: number
  readonly hits: number
  /** Natural logarithm of the chance of so many hits at one given offset of this recording. */
  readonly logChance: number
}

/** Counts, for every offset between log and catalogue, the landmarks that agree on it. */
export type OffsetHistogram = {
  /** Adds a landmark of the log to the newest block. */
  readonly add: (hash: number, frame: number) => void
  /** Starts a new block; blocks beyond the `keep` newest are taken out of the counts. */
  readonly nextBlock: (keep: number) => void
  /** The offsets that stand out among those hit in the newest block, least likely by chance first. */
  readonly candidates: () => Candidate[]
}

type Peak = { readonly bin: number; readonly hits: number; readonly position: number; readonly frame: number }

/** The offsets hit in a block whose counts reach the threshold, highest first. */
function highOffsets(
  block: HitBlock,
  counts: Uint16Array,
  pairCount: (bin: number) => number,
  threshold: number,
): Peak[] {
  const mask = counts.length - 1
  const seen = new Map<number, Peak>()
  for (let i = 0; i < block.length; i++) {
    const position = block.positions[i]
    const frame = block.frames[i]
    const bin = ((position - frame) >> OFFSET_BIN_SHIFT) & mask
    if (counts[bin] * 2 < threshold || seen.has(bin)) continue
    const hits = pairCount(bin)
    if (hits >= threshold) seen.set(bin, { bin, hits, position, frame })
  }
  return [...seen.values()].sort((a, b) => b.hits - a.hits || a.bin - b.bin)
}

/** How the counts are spread over the other offsets of the recording in which the peak lies. */
function backgroundAround(
  { bin, frame }: Peak,
  recording: PlacedRecording,
  counts: Uint16Array,
): BackgroundLaw {
  const mask = counts.length - 1
  const first = (recording.start - frame) >> OFFSET_BIN_SHIFT
  const pairCounts = new Uint16Array(Math.max(16, recording.frames >> OFFSET_BIN_SHIFT))
  for (let i = 0; i < pairCounts.length; i++) {
    const distance = (first + i - bin) & mask
    const isNear = distance <= NEAR_BINS || distance >= counts.length - NEAR_BINS
    pairCounts[i] = isNear ? 0 : counts[(first + i) & mask] + counts[(first + i + 1) & mask]
  }
  return describeBackground(pairCounts)
}

/** Counts for the whole catalogue: two bytes for each four frames of reference, rounded up to a power of two. */
export function createOffsetHistogram(index: CatalogueIndex): OffsetHistogram {
  const { segments, totalFrames } = index
  const counts = new Uint16Array(2 ** Math.ceil(Math.log2((totalFrames + 4096) >> OFFSET_BIN_SHIFT)))
  const mask = counts.length - 1
  const blocks = createHitBlocks()
  const commonest = Math.max(COMMON_HASH_FLOOR, Math.round(index.hashCount * COMMON_HASH_SHARE))

  const pairCount = (bin: number): number =>
    counts[bin] + Math.max(counts[(bin - 1) & mask], counts[(bin + 1) & mask])

  const candidates = (): Candidate[] => {
    const offsets = totalFrames >> OFFSET_BIN_SHIFT
    const mean = (2 * blocks.totalHits()) / offsets
    let threshold = FEWEST_HITS
    while (logPoissonTail(threshold, mean) > Math.log(CHANCE_CANDIDATES / offsets)) threshold++
    const found: Candidate[] = []
    const taken: number[] = []
    for (const peak of highOffsets(blocks.newest(), counts, pairCount, threshold)) {
      if (found.length === MOST_CANDIDATES) break
      if (taken.some((other) => Math.abs(other - peak.bin) <= 2)) continue
      const recording = index.recordingAt(peak.position)
      if (!recording) continue
      taken.push(peak.bin)
      const law = backgroundAround(peak, recording, counts)
      const bin = (peak.position - peak.frame) >> OFFSET_BIN_SHIFT
      found.push({
        recording,
        offset: bin * OFFSET_BIN_FRAMES + OFFSET_BIN_FRAMES / 2,
        hits: peak.hits,
        logChance: logOverdispersedTail(peak.hits, law.mean, law.dispersion),
      })
    }
    return found.sort((a, b) => a.logChance - b.logChance)
  }

  return {
    add(hash, frame) {
      const whole = Math.round(frame)
      for (const { segment, base } of segments) {
        const start = startOfHash(segment, hash)
        const end = endOfHash(segment, hash)
        if (end - start > commonest) continue
        for (let slot = start; slot < end; slot++) {
          const position = base + segment.positions[slot]
          counts[((position - whole) >> OFFSET_BIN_SHIFT) & mask]++
          blocks.append(position, whole)
        }
      }
    },
    nextBlock(keep) {
      blocks.next(keep, (block) => {
        for (let i = 0; i < block.length; i++) {
          counts[((block.positions[i] - block.frames[i]) >> OFFSET_BIN_SHIFT) & mask]--
        }
      })
    },
    candidates,
  }
}
