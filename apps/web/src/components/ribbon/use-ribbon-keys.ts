import { useState, type KeyboardEvent } from 'react'
import type { RibbonSpan } from './ribbon-spans.ts'
import type { RibbonControls } from './use-ribbon-view.ts'

type RibbonKeysOptions = {
  events: readonly RibbonSpan[]
  controls: RibbonControls
  onOpen: ((span: RibbonSpan) => void) | undefined
}

/** The next or previous stretch from the focused one, or from the edge of what is on screen. */
export function neighbourOf(
  events: readonly RibbonSpan[],
  focusKey: string | null,
  direction: 1 | -1,
  viewFromMs: number,
): RibbonSpan | undefined {
  const index = events.findIndex((span) => span.key === focusKey)
  if (index >= 0) return events[index + direction]
  return direction === 1
    ? events.find((span) => span.toMs > viewFromMs)
    : events.findLast((span) => span.toMs <= viewFromMs)
}

/** Which stretch has the focus, and the keys that move it, zoom and open. */
export function useRibbonKeys({ events, controls, onOpen }: RibbonKeysOptions) {
  const [focusKey, setFocusKey] = useState<string | null>(null)
  const focused = events.find((span) => span.key === focusKey) ?? null

  const focusOn = (span: RibbonSpan | undefined) => {
    if (span === undefined) return
    setFocusKey(span.key)
    controls.reveal(span)
  }
  const step = (direction: 1 | -1) => focusOn(neighbourOf(events, focusKey, direction, controls.view.fromMs))
  const open = () => {
    if (focused !== null) onOpen?.(focused)
  }

  const handleKeyDown = (event: KeyboardEvent) => {
    const action = {
      ArrowRight: () => step(1),
      ArrowLeft: () => step(-1),
      Home: () => focusOn(events[0]),
      End: () => focusOn(events.at(-1)),
      PageDown: () => controls.pan(0.8),
      PageUp: () => controls.pan(-0.8),
      '+': () => controls.zoom(0.5),
      '=': () => controls.zoom(0.5),
      '-': () => controls.zoom(2),
      '0': () => controls.showWhole(),
      Enter: open,
    }[event.key]
    if (action === undefined || event.ctrlKey || event.metaKey) return
    event.preventDefault()
    action()
  }
  return { focused, setFocusKey, handleKeyDown }
}
