import type { CatalogueIndex, PlacedRecording, PlacedSegment } from './catalogue-index.ts'
import { endOfHash, startOfHash } from './index-segment.ts'
import { logOverdispersedTail, logPoissonTail } from './statistics.ts'

/** Landmarks agree when their offsets fall in the same or the neighbouring bin of this many frames. */
export const OFFSET_BIN_SHIFT = 2
/** Hits to keep for each hash: what is commoner says nothing. Grows with the catalogue. */
const COMMON_HASH_FLOOR = 64
const COMMON_HASH_SHARE = 1 / 20_000
const MOST_CANDIDATES = 24
/** Candidates expected by pure chance in one look at the histogram. */
const CHANCE_CANDIDATES = 20
const FEWEST_HITS = 4

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
  /** Starts a new block; blocks beyond `keep` are taken out of the counts again. */
  readonly nextBlock: (keep: number) => void
  /** The offsets that stand out among those hit in the newest `blocks` blocks, strongest first. */
  readonly candidates: (blocks: number) => Candidate[]
  readonly clear: () => void
}

type Block = { positions: Uint32Array; frames: Int32Array; length: number }

function emptyBlock(): Block {
  return { positions: new Uint32Array(1024), frames: new Int32Array(1024), length: 0 }
}

function grow(block: Block): void {
  const positions = new Uint32Array(block.positions.length * 2)
  const frames = new Int32Array(block.frames.length * 2)
  positions.set(block.positions)
  frames.set(block.frames)
  block.positions = positions
  block.frames = frames
}

/** Mean and dispersion (variance / mean) of pair counts; the highest hundredth of offsets is left out as self-likeness. */
export function describeBackground(pairCounts: ArrayLike<number>): { mean: number; dispersion: number } {
  const sorted = Float64Array.from(pairCounts).sort()
  const kept = Math.max(1, Math.floor(sorted.length * 0.99))
  let sum = 0
  let squares = 0
  for (let i = 0; i < kept; i++) {
    sum += sorted[i]
    squares += sorted[i] * sorted[i]
  }
  const mean = Math.max(sum / kept, 0.5 / kept)
  const variance = squares / kept - (sum / kept) ** 2
  return { mean, dispersion: Math.max(1, variance / mean) * 1.3 }
}

/** Counts by offset for the whole catalogue. Memory: two bytes per four frames of reference, rounded up to a power of 2. */
export function createOffsetHistogram(index: CatalogueIndex): OffsetHistogram {
  const segments: readonly PlacedSegment[] = index.segments
  const bins = 2 ** Math.ceil(Math.log2((index.totalFrames + 4096) >> OFFSET_BIN_SHIFT))
  const mask = bins - 1
  const counts = new Uint16Array(bins)
  const blocks: Block[] = [emptyBlock()]
  const spare: Block[] = []
  const commonest = Math.max(COMMON_HASH_FLOOR, Math.round(index.hashCount * COMMON_HASH_SHARE))

  const addHits = (placed: PlacedSegment, hash: number, frame: number, block: Block): void => {
    const { segment, base } = placed
    const start = startOfHash(segment, hash)
    const end = endOfHash(segment, hash)
    if (end - start > commonest) return
    for (let slot = start; slot < end; slot++) {
      const position = base + segment.positions[slot]
      counts[((position - frame) >> OFFSET_BIN_SHIFT) & mask]++
      if (block.length === block.positions.length) grow(block)
      block.positions[block.length] = position
      block.frames[block.length] = frame
      block.length++
    }
  }

  const takeOut = (block: Block): void => {
    for (let i = 0; i < block.length; i++) {
      counts[((block.positions[i] - block.frames[i]) >> OFFSET_BIN_SHIFT) & mask]--
    }
    block.length = 0
    spare.push(block)
  }

  const pairCount = (bin: number): number => {
    const middle = counts[bin & mask]
    return middle + Math.max(counts[(bin - 1) & mask], counts[(bin + 1) & mask])
  }

  /** How the counts are spread over the other offsets of a recording. */
  const backgroundOf = (recording: PlacedRecording, bin: number, frame: number) => {
    const first = (recording.start - frame) >> OFFSET_BIN_SHIFT
    const length = Math.max(16, recording.frames >> OFFSET_BIN_SHIFT)
    const pairCounts = new Uint16Array(length)
    for (let i = 0; i < length; i++) {
      const other = first + i
      const isNear = Math.abs(((other - bin) << (32 - Math.log2(bins))) >> (32 - Math.log2(bins))) <= 3
      pairCounts[i] = isNear ? 0 : counts[other & mask] + counts[(other + 1) & mask]
    }
    return describeBackground(pairCounts)
  }

  const collect = (
    recent: readonly Block[],
    threshold: number,
  ): { bin: number; hits: number; position: number; frame: number }[] => {
    const seen = new Map<number, { bin: number; hits: number; position: number; frame: number }>()
    for (const block of recent) {
      for (let i = 0; i < block.length; i++) {
        const position = block.positions[i]
        const frame = block.frames[i]
        const bin = ((position - frame) >> OFFSET_BIN_SHIFT) & mask
        if (counts[bin] * 2 < threshold || seen.has(bin)) continue
        const hits = pairCount(bin)
        if (hits >= threshold) seen.set(bin, { bin, hits, position, frame })
      }
    }
    return [...seen.values()].sort((a, b) => b.hits - a.hits || a.bin - b.bin)
  }

  const candidates = (newest: number): Candidate[] => {
    const total = blocks.reduce((sum, block) => sum + block.length, 0)
    const mean = (2 * total) / (index.totalFrames >> OFFSET_BIN_SHIFT)
    const allowed = Math.log(CHANCE_CANDIDATES / (index.totalFrames >> OFFSET_BIN_SHIFT))
    let threshold = FEWEST_HITS
    while (logPoissonTail(threshold, mean) > allowed) threshold++
    const found: Candidate[] = []
    const taken: number[] = []
    for (const { bin, hits, position, frame } of collect(blocks.slice(-newest), threshold)) {
      if (found.length === MOST_CANDIDATES) break
      if (taken.some((other) => Math.abs(other - bin) <= 2)) continue
      const recording = index.recordingAt(position)
      if (!recording) continue
      taken.push(bin)
      const { mean: expected, dispersion } = backgroundOf(recording, bin, frame)
      const offset =
        ((position - frame) >> OFFSET_BIN_SHIFT) * 2 ** OFFSET_BIN_SHIFT + 2 ** (OFFSET_BIN_SHIFT - 1)
      found.push({ recording, offset, hits, logChance: logOverdispersedTail(hits, expected, dispersion) })
    }
    return found.sort((a, b) => a.logChance - b.logChance)
  }

  return {
    add(hash, frame) {
      const whole = Math.round(frame)
      const block = blocks[blocks.length - 1]
      for (const placed of segments) addHits(placed, hash, whole, block)
    },
    nextBlock(keep) {
      blocks.push(spare.pop() ?? emptyBlock())
      while (blocks.length > keep) {
        const oldest = blocks.shift()
        if (oldest) takeOut(oldest)
      }
    },
    candidates,
    clear() {
      for (const block of blocks.splice(0)) takeOut(block)
      blocks.push(spare.pop() ?? emptyBlock())
    },
  }
}
