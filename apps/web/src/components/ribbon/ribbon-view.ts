/** A stretch of time on screen, in epoch milliseconds. */
export type RibbonView = { fromMs: number; toMs: number }

/** The closest one can look: ten seconds across the whole width. */
export const NARROWEST_VIEW_MS = 10_000

export function viewSpanMs(view: RibbonView): number {
  return view.toMs - view.fromMs
}

/** Moves a view of a given length into the bounds, never past their ends. */
function place(fromMs: number, spanMs: number, bounds: RibbonView): RibbonView {
  const span = Math.min(Math.max(spanMs, NARROWEST_VIEW_MS), viewSpanMs(bounds))
  const from = Math.min(Math.max(fromMs, bounds.fromMs), bounds.toMs - span)
  return { fromMs: from, toMs: from + span }
}

/** Zooms by a factor (below 1 looks closer); the moment at `anchorMs` keeps its place on screen. */
export function zoomView(view: RibbonView, factor: number, anchorMs: number, bounds: RibbonView): RibbonView {
  const span = Math.min(Math.max(viewSpanMs(view) * factor, NARROWEST_VIEW_MS), viewSpanMs(bounds))
  const part = (anchorMs - view.fromMs) / viewSpanMs(view)
  return place(anchorMs - part * span, span, bounds)
}

/** Moves by a part of what is on screen; negative is earlier. */
export function panView(view: RibbonView, part: number, bounds: RibbonView): RibbonView {
  return place(view.fromMs + part * viewSpanMs(view), viewSpanMs(view), bounds)
}

/** Brings a stretch into sight without changing the zoom, unless it does not fit. */
export function revealSpan(view: RibbonView, span: RibbonView, bounds: RibbonView): RibbonView {
  if (span.fromMs >= view.fromMs && span.toMs <= view.toMs) return view
  const length = Math.max(viewSpanMs(view), viewSpanMs(span) * 1.5)
  const middle = (span.fromMs + span.toMs) / 2
  return place(middle - length / 2, length, bounds)
}

export function timeToX(timeMs: number, view: RibbonView, width: number): number {
  return ((timeMs - view.fromMs) / viewSpanMs(view)) * width
}

export function xToTime(x: number, view: RibbonView, width: number): number {
  return view.fromMs + (x / width) * viewSpanMs(view)
}

const SECOND = 1_000
const MINUTE = 60 * SECOND
const HOUR = 60 * MINUTE

const tickStepsMs = [
  SECOND,
  2 * SECOND,
  5 * SECOND,
  10 * SECOND,
  30 * SECOND,
  MINUTE,
  2 * MINUTE,
  5 * MINUTE,
  10 * MINUTE,
  30 * MINUTE,
  HOUR,
  2 * HOUR,
  3 * HOUR,
  6 * HOUR,
] as const

/** The finest step whose labels keep their distance. */
export function tickStepMs(view: RibbonView, width: number, labelWidth = 72): number {
  const room = Math.max(1, Math.floor(width / labelWidth))
  const wanted = viewSpanMs(view) / room
  return tickStepsMs.find((step) => step >= wanted) ?? 12 * HOUR
}

/**
 * Tick moments, counted from the start of the bounds: midnight of the station's day. On the day clocks change, the
 * labels carry the local time, so a step that crosses the change reads one hour more or less, as the clock did.
 */
export function tickTimes(view: RibbonView, width: number, bounds: RibbonView): number[] {
  const step = tickStepMs(view, width)
  const first = bounds.fromMs + Math.ceil((view.fromMs - bounds.fromMs) / step) * step
  const count = Math.max(0, Math.floor((view.toMs - first) / step) + 1)
  return Array.from({ length: count }, (_, index) => first + index * step)
}
