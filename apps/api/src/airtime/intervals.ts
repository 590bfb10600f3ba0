/** A half-open stretch of time in milliseconds since the epoch. */
export type Interval = { fromMs: number; toMs: number }

function isNotEmpty(interval: Interval): boolean {
  return interval.toMs > interval.fromMs
}

function inOrder(intervals: readonly Interval[]): Interval[] {
  return intervals.filter(isNotEmpty).sort((left, right) => left.fromMs - right.fromMs)
}

/** The same time without overlaps, in order. Neighbours no more than `joinMs` apart become one. */
export function unionOf(intervals: readonly Interval[], joinMs = 0): Interval[] {
  const joined: Interval[] = []
  for (const { fromMs, toMs } of inOrder(intervals)) {
    const last = joined.at(-1)
    if (last !== undefined && fromMs - last.toMs <= joinMs) last.toMs = Math.max(last.toMs, toMs)
    else joined.push({ fromMs, toMs })
  }
  return joined
}

/** What of `minuend` is in none of `subtrahend`, in order and without overlaps. */
export function subtract(minuend: readonly Interval[], subtrahend: readonly Interval[]): Interval[] {
  const removed = unionOf(subtrahend)
  const remaining: Interval[] = []
  let next = 0
  for (const { fromMs, toMs } of unionOf(minuend)) {
    let cursorMs = fromMs
    for (let past = removed[next]; past !== undefined && past.toMs <= fromMs; past = removed[next]) next += 1
    for (let index = next; ; index += 1) {
      const hole = removed[index]
      if (hole === undefined || hole.fromMs >= toMs) break
      remaining.push({ fromMs: cursorMs, toMs: hole.fromMs })
      cursorMs = Math.max(cursorMs, hole.toMs)
    }
    remaining.push({ fromMs: cursorMs, toMs })
  }
  return remaining.filter(isNotEmpty)
}

/** The part within `bounds`; null when nothing of it is. */
export function clip<Span extends Interval>(span: Span, bounds: Interval): Span | null {
  const fromMs = Math.max(span.fromMs, bounds.fromMs)
  const toMs = Math.min(span.toMs, bounds.toMs)
  return toMs > fromMs ? { ...span, fromMs, toMs } : null
}

export function clipAll<Span extends Interval>(spans: readonly Span[], bounds: Interval): Span[] {
  return spans.flatMap((span) => clip(span, bounds) ?? [])
}

/** Seconds covered; what overlaps counts once. */
export function coveredSeconds(intervals: readonly Interval[]): number {
  return unionOf(intervals).reduce((sum, { fromMs, toMs }) => sum + (toMs - fromMs), 0) / 1000
}
