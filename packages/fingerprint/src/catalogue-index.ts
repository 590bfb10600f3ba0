import type { IndexSegment } from './index-segment.ts'
import { engineParameters } from './parameters.ts'

/** A segment with its place on the axis of the whole catalogue. */
export type PlacedSegment = { readonly segment: IndexSegment; readonly base: number }

/** A recording with its place on the axis of the whole catalogue. */
export type PlacedRecording = {
  readonly recordingNumber: number
  readonly segment: IndexSegment
  /** First position within its segment. */
  readonly segmentStart: number
  /** First position on the whole axis. */
  readonly start: number
  readonly frames: number
}

/** The reference catalogue as the search sees it. Recordings come in segments and leave one by one. */
export type CatalogueIndex = {
  /** @throws RangeError when a recording of the segment is already present. */
  readonly addSegment: (segment: IndexSegment) => void
  /** Its landmarks stay in memory until its segment is built anew, but it is never found again. */
  readonly removeRecording: (recordingNumber: number) => boolean
  readonly recordingCount: number
  readonly hashCount: number
  readonly byteLength: number
  /** The segments at this moment. */
  readonly segments: readonly PlacedSegment[]
  /** Length of the whole axis. */
  readonly totalFrames: number
  /** The recording at a position of the whole axis, or null in a gap or where one was removed. */
  readonly recordingAt: (position: number) => PlacedRecording | null
}

/** Room before and after each segment, longer than any landmark. */
const SEGMENT_GAP_FRAMES = 4 * engineParameters.maximumFrameDistance

function lastAtOrBelow(count: number, at: (n: number) => number, value: number): number {
  let low = 0
  let high = count
  while (low < high) {
    const middle = (low + high) >>> 1
    if (at(middle) <= value) low = middle + 1
    else high = middle
  }
  return low - 1
}

/** Makes an empty index. */
export function createIndex(): CatalogueIndex {
  const placed: PlacedSegment[] = []
  /** Which segment's copy of a recording counts: a recording may leave and come back in a later segment. */
  const present = new Map<number, IndexSegment>()
  let totalFrames = SEGMENT_GAP_FRAMES

  const recordingAt = (position: number): PlacedRecording | null => {
    const found = placed[lastAtOrBelow(placed.length, (n) => placed[n].base, position)]
    // eslint-disable-next-line @typescript-eslint/no-unnecessary-condition -- list access is unchecked in this package
    if (!found) return null
    const { segment, base } = found
    const local = position - base
    const n = lastAtOrBelow(segment.recordingStarts.length, (i) => segment.recordingStarts[i], local)
    if (n < 0) return null
    const segmentStart = segment.recordingStarts[n]
    const frames = segment.recordingFrames[n]
    const recordingNumber = segment.recordingNumbers[n]
    if (local >= segmentStart + frames || present.get(recordingNumber) !== segment) return null
    return { recordingNumber, segment, segmentStart, start: base + segmentStart, frames }
  }

  return {
    addSegment(segment) {
      for (const number of segment.recordingNumbers) {
        if (present.has(number)) throw new RangeError(`recording ${number} is already in the index`)
      }
      for (const number of segment.recordingNumbers) present.set(number, segment)
      placed.push({ segment, base: totalFrames })
      totalFrames += segment.totalFrames + SEGMENT_GAP_FRAMES
    },
    removeRecording: (recordingNumber) => present.delete(recordingNumber),
    get recordingCount() {
      return present.size
    },
    get hashCount() {
      return placed.reduce((sum, { segment }) => sum + segment.positions.length, 0)
    },
    get byteLength() {
      return placed.reduce((sum, { segment }) => sum + segment.buffer.byteLength, 0)
    },
    get segments() {
      return [...placed]
    },
    get totalFrames() {
      return totalFrames
    },
    recordingAt,
  }
}
