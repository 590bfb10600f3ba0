import type { LogSpan } from '@fieldfare/database'

type Stretch = { startMs: number; endMs: number }

/** Joins stretches that touch or overlap, in order of time. */
function union(stretches: readonly Stretch[]): Stretch[] {
  const joined: Stretch[] = []
  for (const stretch of [...stretches].sort((left, right) => left.startMs - right.startMs)) {
    const last = joined.at(-1)
    if (last && stretch.startMs <= last.endMs) last.endMs = Math.max(last.endMs, stretch.endMs)
    else joined.push({ ...stretch })
  }
  return joined
}

/** Cuts `taken` (joined and in order) out of a span. */
function without(span: LogSpan, taken: readonly Stretch[]): LogSpan[] {
  const rest: LogSpan[] = []
  let position = span.startMs
  for (const { startMs, endMs } of taken) {
    if (endMs <= position || startMs >= span.endMs) continue
    if (startMs > position) rest.push({ ...span, startMs: position, endMs: startMs })
    position = endMs
  }
  if (position < span.endMs) rest.push({ ...span, startMs: position })
  return rest
}

/**
 * What was recognised is music, whatever the classifier heard in it: a voice over a tune sounds like speech, yet the
 * tune is played. Neighbouring spans of one kind are joined, parts outside the log cut off.
 */
export function markIdentifiedAsMusic(
  heard: readonly LogSpan[],
  identified: readonly Stretch[],
  durationMs: number,
): LogSpan[] {
  const clipped = identified.map(({ startMs, endMs }) => ({ startMs, endMs: Math.min(endMs, durationMs) }))
  const taken = union(clipped.filter(({ startMs, endMs }) => endMs > startMs))
  const spans = heard
    .map((span) => ({ ...span, endMs: Math.min(span.endMs, durationMs) }))
    .filter(({ startMs, endMs }) => endMs > startMs)
    .flatMap((span) => without(span, taken))
    .concat(taken.map((stretch) => ({ ...stretch, kind: 'music' })))
    .sort((left, right) => left.startMs - right.startMs)
  const joined: LogSpan[] = []
  for (const span of spans) {
    const last = joined.at(-1)
    if (last && last.kind === span.kind && span.startMs <= last.endMs) last.endMs = span.endMs
    else joined.push({ ...span })
  }
  return joined
}

/** Milliseconds of one kind. */
export function totalMs(spans: readonly LogSpan[], kind: LogSpan['kind']): number {
  return spans.reduce((sum, span) => sum + (span.kind === kind ? span.endMs - span.startMs : 0), 0)
}
