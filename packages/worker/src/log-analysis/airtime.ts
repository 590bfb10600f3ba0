import type { HeldAirtime } from '@fieldfare/database'

/** Recorders start the next file a moment before they end the last one. */
export const OVERLAP_TOLERANCE_MS = 2000

export type AirtimeDecision =
  { kind: 'free'; from: Date; to: Date } | { kind: 'overlap'; held: HeldAirtime; overlapMs: number }

/**
 * What a log covers beside the logs that are held: an overlap of up to two seconds at either end is given to the log
 * that came first, a longer one is refused, since its plays would be counted twice.
 */
export function decideAirtime(
  stretch: { from: Date; to: Date },
  held: readonly HeldAirtime[],
): AirtimeDecision {
  let from = stretch.from.getTime()
  let to = stretch.to.getTime()
  for (const other of held) {
    const otherFrom = Date.parse(other.from)
    const otherTo = Date.parse(other.to)
    const overlapMs = Math.min(to, otherTo) - Math.max(from, otherFrom)
    if (overlapMs <= 0) continue
    const isAtStart = otherFrom <= from && otherTo < to
    const isAtEnd = otherTo >= to && otherFrom > from
    if (overlapMs > OVERLAP_TOLERANCE_MS || (!isAtStart && !isAtEnd))
      return { kind: 'overlap', held: other, overlapMs }
    if (isAtStart) from = otherTo
    else to = otherFrom
  }
  return { kind: 'free', from: new Date(from), to: new Date(to) }
}
