import { useEffect, useRef, useState, type PointerEvent } from 'react'
import { formatClock } from '../../lib/format-time.ts'
import { useShownTheme } from '../../lib/theme.ts'
import { paintFocus, paintRibbon } from './ribbon-paint.ts'
import { ribbonKindLabels, spanAt, type RibbonSpan } from './ribbon-spans.ts'
import { tickStepMs, tickTimes, timeToX, xToTime, type RibbonView } from './ribbon-view.ts'
import { useElementWidth } from './use-element-width.ts'
import type { RibbonControls } from './use-ribbon-view.ts'

type RibbonCanvasProps = {
  spans: readonly RibbonSpan[]
  events: readonly RibbonSpan[]
  bounds: RibbonView
  controls: RibbonControls
  timeZone: string
  focused: RibbonSpan | null
  onPick: (span: RibbonSpan) => void
}

const CLICK_SLACK_PIXELS = 4

/** The picture itself with its time scale; dragging moves it, a click opens what lies under the pointer. */
export function RibbonCanvas({
  spans,
  events,
  bounds,
  controls,
  timeZone,
  focused,
  onPick,
}: RibbonCanvasProps) {
  const canvas = useRef<HTMLCanvasElement>(null)
  const drag = useRef<{ lastX: number; moved: number } | null>(null)
  const width = useElementWidth(canvas)
  const theme = useShownTheme()
  const [hovered, setHovered] = useState<RibbonSpan | null>(null)
  const { view, pan } = controls

  useEffect(() => {
    if (canvas.current === null || width === 0) return
    paintRibbon(canvas.current, spans, view)
    if (focused !== null) {
      paintFocus(canvas.current, timeToX(focused.fromMs, view, width), timeToX(focused.toMs, view, width))
    }
  }, [spans, view, width, theme, focused])

  const spanUnder = (event: PointerEvent<HTMLCanvasElement>): RibbonSpan | null => {
    const left = event.currentTarget.getBoundingClientRect().left
    const slackMs = ((view.toMs - view.fromMs) / Math.max(1, width)) * CLICK_SLACK_PIXELS
    return spanAt(events, xToTime(event.clientX - left, view, width), slackMs)
  }
  const handleDown = (event: PointerEvent<HTMLCanvasElement>) => {
    event.currentTarget.setPointerCapture(event.pointerId)
    drag.current = { lastX: event.clientX, moved: 0 }
  }
  const handleMove = (event: PointerEvent<HTMLCanvasElement>) => {
    if (drag.current === null) {
      setHovered(spanUnder(event))
      return
    }
    const shift = event.clientX - drag.current.lastX
    drag.current = { lastX: event.clientX, moved: drag.current.moved + Math.abs(shift) }
    pan(-shift / Math.max(1, width))
  }
  const handleUp = (event: PointerEvent<HTMLCanvasElement>) => {
    const wasClick = drag.current !== null && drag.current.moved <= CLICK_SLACK_PIXELS
    drag.current = null
    const span = wasClick ? spanUnder(event) : null
    if (span !== null) onPick(span)
  }

  return (
    <div className="relative">
      <div className="h-20 border border-edge bg-sheet">
        <canvas
          ref={canvas}
          aria-hidden
          className={`block size-full touch-pan-y ${hovered === null ? 'cursor-grab' : 'cursor-pointer'}`}
          onPointerDown={handleDown}
          onPointerMove={handleMove}
          onPointerUp={handleUp}
          onPointerLeave={() => setHovered(null)}
        />
      </div>
      <TimeScale view={view} bounds={bounds} width={width} timeZone={timeZone} />
      {hovered !== null && <HoverLabel span={hovered} view={view} width={width} timeZone={timeZone} />}
    </div>
  )
}

function TimeScale({
  view,
  bounds,
  width,
  timeZone,
}: {
  view: RibbonView
  bounds: RibbonView
  width: number
  timeZone: string
}) {
  const precision = tickStepMs(view, width) < 60_000 ? 'second' : 'minute'
  return (
    <div aria-hidden className="relative h-6 overflow-hidden">
      {width > 0 &&
        tickTimes(view, width, bounds).map((timeMs) => (
          <span
            key={timeMs}
            className="absolute top-0 border-l border-edge pl-1 figures text-slate"
            style={{ left: timeToX(timeMs, view, width) }}
          >
            {formatClock(timeMs, timeZone, precision)}
          </span>
        ))}
    </div>
  )
}

type HoverLabelProps = { span: RibbonSpan; view: RibbonView; width: number; timeZone: string }

function HoverLabel({ span, view, width, timeZone }: HoverLabelProps) {
  return (
    <div
      aria-hidden
      className="pointer-events-none absolute bottom-full z-10 mb-1 max-w-72 border border-edge bg-paper px-2 py-1 text-sm shadow-lift"
      style={{ left: Math.max(0, Math.min(timeToX(span.fromMs, view, width), width - 220)) }}
    >
      <span className="font-semibold">{span.label ?? ribbonKindLabels[span.kind]}</span>
      <span className="block figures text-slate">
        {formatClock(span.fromMs, timeZone, 'second')} – {formatClock(span.toMs, timeZone, 'second')}
      </span>
    </div>
  )
}
