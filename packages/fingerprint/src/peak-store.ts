import { createNumberList } from './growable.ts'

/** Peaks in order of time, oldest droppable. Frames and bins carry fractions. */
export type PeakStore = {
  readonly add: (frame: number, bin: number, rank: number) => void
  readonly count: () => number
  readonly frame: (index: number) => number
  readonly bin: (index: number) => number
  readonly rank: (index: number) => number
  /** First peak whose whole frame number is at least `frame`. */
  readonly firstAtOrAfter: (frame: number) => number
  readonly dropBefore: (frame: number) => void
}

export function createPeakStore(): PeakStore {
  const frames = createNumberList(4096)
  const bins = createNumberList(4096)
  const ranks = createNumberList(4096)

  const firstAtOrAfter = (frame: number): number => {
    // Peaks lie within half a frame of their row and come row by row, so rounding restores the order.
    let low = 0
    let high = frames.length()
    while (low < high) {
      const middle = (low + high) >>> 1
      if (Math.round(frames.get(middle)) < frame) low = middle + 1
      else high = middle
    }
    return low
  }

  return {
    add(frame, bin, rank) {
      frames.push(frame)
      bins.push(bin)
      ranks.push(rank)
    },
    count: frames.length,
    frame: frames.get,
    bin: bins.get,
    rank: ranks.get,
    firstAtOrAfter,
    dropBefore(frame) {
      const count = firstAtOrAfter(frame)
      if (count === 0) return
      frames.dropFirst(count)
      bins.dropFirst(count)
      ranks.dropFirst(count)
    },
  }
}
