import { useEffect, useEffectEvent, useState, type RefObject } from 'react'
import { panView, revealSpan, viewSpanMs, xToTime, zoomView, type RibbonView } from './ribbon-view.ts'

export type RibbonControls = {
  view: RibbonView
  isWhole: boolean
  zoom: (factor: number) => void
  pan: (part: number) => void
  reveal: (span: RibbonView) => void
  showWhole: () => void
}

/** The part of a ribbon on screen, moved by buttons and keys, the wheel (with Ctrl: zoom) and dragging. */
export function useRibbonView(
  bounds: RibbonView,
  surface: RefObject<HTMLElement | null>,
  initialView?: RibbonView,
): RibbonControls {
  const [view, setView] = useState(initialView ?? bounds)

  const handleWheel = useEffectEvent((event: WheelEvent) => {
    const box = surface.current?.getBoundingClientRect()
    if (box === undefined) return
    const isSideways = Math.abs(event.deltaX) > Math.abs(event.deltaY)
    if (!event.ctrlKey && !event.altKey && !isSideways) return
    event.preventDefault()
    if (isSideways) {
      setView((current) => panView(current, event.deltaX / box.width, bounds))
      return
    }
    const factor = Math.exp(event.deltaY / 300)
    setView((current) =>
      zoomView(current, factor, xToTime(event.clientX - box.left, current, box.width), bounds),
    )
  })
  useEffect(() => {
    const element = surface.current
    const listen = (event: WheelEvent) => handleWheel(event)
    // React listens passively to the wheel; keeping the page still while zooming needs a listener of our own.
    element?.addEventListener('wheel', listen, { passive: false })
    return () => element?.removeEventListener('wheel', listen)
  }, [surface])

  return {
    view,
    isWhole: viewSpanMs(view) >= viewSpanMs(bounds),
    zoom: (factor) =>
      setView((current) => zoomView(current, factor, (current.fromMs + current.toMs) / 2, bounds)),
    pan: (part) => setView((current) => panView(current, part, bounds)),
    reveal: (span) => setView((current) => revealSpan(current, span, bounds)),
    showWhole: () => setView(bounds),
  }
}
