import { useEffect, type RefObject } from 'react'

const OPERABLE = 'a[href], button:not(:disabled), input:not(:disabled), select:not(:disabled)'

function operableIn(row: Element | undefined): HTMLElement[] {
  return Array.from(row?.querySelectorAll<HTMLElement>(OPERABLE) ?? [])
}

function targetRow(rows: readonly Element[], index: number, key: string): Element | undefined {
  if (key === 'ArrowDown') return rows[index + 1]
  if (key === 'ArrowUp') return rows[index - 1]
  if (key === 'Home') return rows[0]
  return key === 'End' ? rows.at(-1) : undefined
}

/** Moves the focus to the same control of another row; fields that need the arrow keys themselves keep them. */
export function moveRowFocus(body: HTMLTableSectionElement, event: KeyboardEvent): void {
  const from = event.target
  if (!(from instanceof HTMLElement) || from.matches('select, input:not([type=checkbox])')) return
  const row = from.closest('tr')
  if (row === null) return
  const rows = Array.from(body.rows)
  const target = targetRow(rows, rows.indexOf(row), event.key)
  if (target === undefined) return
  const controls = operableIn(target)
  const next = controls[operableIn(row).indexOf(from)] ?? controls[0]
  if (next === undefined) return
  event.preventDefault()
  next.focus()
}

/** Arrow keys, Home and End between the rows of a table body. */
export function useRowKeys(body: RefObject<HTMLTableSectionElement | null>): void {
  useEffect(() => {
    const element = body.current
    if (element === null) return undefined
    const handle = (event: KeyboardEvent) => moveRowFocus(element, event)
    element.addEventListener('keydown', handle)
    return () => element.removeEventListener('keydown', handle)
  }, [body])
}
