import { useEffect, useEffectEvent } from 'react'

function isTyping(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    target.closest('input, textarea, select, dialog, [role=application]') !== null
  )
}

/** Single keys that act on the page, never while somebody types or holds a modifier. */
export function useReviewKeys(isOn: boolean, actions: Readonly<Record<string, () => void>>): void {
  const handle = useEffectEvent((event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return
    const action = actions[event.key.toLowerCase()]
    if (action === undefined) return
    event.preventDefault()
    action()
  })
  useEffect(() => {
    if (!isOn) return undefined
    const listen = (event: KeyboardEvent) => handle(event)
    document.addEventListener('keydown', listen)
    return () => document.removeEventListener('keydown', listen)
  }, [isOn])
}
