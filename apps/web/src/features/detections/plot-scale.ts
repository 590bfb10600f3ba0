const steps = [1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600] as const

export type Extent = { from: number; to: number }

/** Round moments within an extent, at most `most` of them. */
export function ticksWithin({ from, to }: Extent, most: number): number[] {
  const step = steps.find((candidate) => (to - from) / candidate <= most) ?? 7200
  const first = Math.ceil(from / step)
  const count = Math.floor(to / step) - first + 1
  return Array.from({ length: Math.max(0, count) }, (_, index) => (first + index) * step)
}

/** The extent of some values, never of no length. */
export function extentOf(values: readonly number[]): Extent {
  const from = Math.min(...values)
  const to = Math.max(...values)
  return to > from ? { from, to } : { from, to: from + 1 }
}
