import type { AirtimeKind, AirtimeSpan } from '@fieldfare/contracts'
import { timeToX, type RibbonView } from './ribbon-view.ts'

/** 'gap' is airtime of which nothing is held; the server sends what is held, the gaps follow from it. */
export type RibbonKind = AirtimeKind | 'gap'

export type RibbonSpan = Omit<AirtimeSpan, 'kind' | 'from' | 'to'> & {
  key: string
  kind: RibbonKind
  fromMs: number
  toMs: number
}

export const ribbonKindLabels = {
  play: 'Play',
  review: 'To review',
  unidentified: 'Unidentified music',
  music: 'Music',
  speech: 'Speech',
  silence: 'Silence',
  held: 'Held',
  gap: 'Nothing held',
} as const satisfies Record<RibbonKind, string>

/** What one can step through and open, as against the ground it lies on. */
export const eventKinds: ReadonlySet<RibbonKind> = new Set<RibbonKind>(['play', 'review', 'unidentified'])

export type TimedKind = { kind: AirtimeKind; from: string; to: string }

/** Stretches of the bounds that no held span covers; overlapping logs count once. */
export function gapsOf(held: readonly RibbonView[], bounds: RibbonView): RibbonView[] {
  const gaps: RibbonView[] = []
  let coveredTo = bounds.fromMs
  for (const span of [...held].sort((one, other) => one.fromMs - other.fromMs)) {
    if (span.fromMs > coveredTo) gaps.push({ fromMs: coveredTo, toMs: Math.min(span.fromMs, bounds.toMs) })
    coveredTo = Math.max(coveredTo, span.toMs)
  }
  if (coveredTo < bounds.toMs) gaps.push({ fromMs: coveredTo, toMs: bounds.toMs })
  return gaps.filter((gap) => gap.toMs > gap.fromMs)
}

const blank = { label: null, logId: null, detectionId: null, playId: null }

/** Spans as the ribbon draws them, gaps included, in order of time. */
export function ribbonSpans(
  spans: readonly (TimedKind & Partial<Omit<AirtimeSpan, keyof TimedKind>>)[],
  bounds: RibbonView,
): RibbonSpan[] {
  const drawn = spans.map((span, index): RibbonSpan => ({
    ...blank,
    ...span,
    key: `${span.kind}-${index}`,
    fromMs: Date.parse(span.from),
    toMs: Date.parse(span.to),
  }))
  const gaps = gapsOf(
    drawn.filter((span) => span.kind === 'held'),
    bounds,
  ).map((gap): RibbonSpan => ({ ...blank, ...gap, key: `gap-${gap.fromMs}`, kind: 'gap' }))
  return [...drawn, ...gaps].sort((one, other) => one.fromMs - other.fromMs || one.toMs - other.toMs)
}

export type PixelSpan = { kind: RibbonKind; left: number; right: number }

/**
 * Spans in pixels, cut to the view. Neighbours of one kind closer than half a pixel become one rectangle, so that a
 * month of plays costs as many rectangles as the screen has pixels; nothing is narrower than one pixel, or a play
 * of ten seconds would vanish from the day.
 */
export function pixelSpans(
  spans: readonly RibbonSpan[],
  kind: RibbonKind,
  view: RibbonView,
  width: number,
): PixelSpan[] {
  const joined: PixelSpan[] = []
  for (const span of spans) {
    if (span.kind !== kind || span.toMs <= view.fromMs || span.fromMs >= view.toMs) continue
    const left = Math.max(0, timeToX(span.fromMs, view, width))
    const right = Math.min(width, Math.max(timeToX(span.toMs, view, width), left + 1))
    const last = joined.at(-1)
    if (last !== undefined && left - last.right < 0.5 && width / (view.toMs - view.fromMs) < 0.001) {
      last.right = Math.max(last.right, right)
    } else {
      joined.push({ kind, left, right })
    }
  }
  return joined
}

/** The event under a moment, the shortest where several overlap; a little slack helps small ones to be hit. */
export function spanAt(events: readonly RibbonSpan[], timeMs: number, slackMs: number): RibbonSpan | null {
  const hits = events.filter((span) => timeMs >= span.fromMs - slackMs && timeMs <= span.toMs + slackMs)
  return hits.reduce<RibbonSpan | null>(
    (best, span) => (best === null || span.toMs - span.fromMs < best.toMs - best.fromMs ? span : best),
    null,
  )
}
