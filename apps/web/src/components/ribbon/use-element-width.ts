import { useEffect, useState, type RefObject } from 'react'

/** The width of an element as it is laid out, in CSS pixels. */
export function useElementWidth(element: RefObject<HTMLElement | null>): number {
  const [width, setWidth] = useState(0)
  useEffect(() => {
    if (element.current === null) return undefined
    const observer = new ResizeObserver((entries) => {
      const entry = entries[0]
      if (entry !== undefined) setWidth(entry.contentRect.width)
    })
    observer.observe(element.current)
    return () => observer.disconnect()
  }, [element])
  return width
}
