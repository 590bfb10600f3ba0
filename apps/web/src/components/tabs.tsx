import { useId, useRef, useState, type KeyboardEvent, type ReactNode } from 'react'
import { classNames } from '../lib/class-names.ts'

export type Tab = { id: string; label: ReactNode; content: ReactNode }

export type TabsProps = {
  label: string
  tabs: readonly Tab[]
  /** Give both to keep the choice elsewhere, for example in the address. */
  selectedId?: string
  onSelect?: (id: string) => void
}

/** Tabs after the ARIA authoring practices: arrow keys move, Home and End jump. */
export function Tabs({ label, tabs, selectedId, onSelect }: TabsProps) {
  const baseId = useId()
  const list = useRef<HTMLDivElement>(null)
  const [ownId, setOwnId] = useState(tabs[0]?.id ?? '')
  const current = tabs.find((tab) => tab.id === (selectedId ?? ownId)) ?? tabs[0]

  const select = (index: number) => {
    const tab = tabs.at(index % tabs.length)
    if (tab === undefined) return
    setOwnId(tab.id)
    onSelect?.(tab.id)
    const button = list.current?.children.item(tabs.indexOf(tab))
    if (button instanceof HTMLElement) button.focus()
  }
  const handleKeyDown = (event: KeyboardEvent) => {
    const index = current === undefined ? 0 : tabs.indexOf(current)
    const target = { ArrowRight: index + 1, ArrowLeft: index - 1, Home: 0, End: -1 }[event.key]
    if (target === undefined) return
    event.preventDefault()
    select(target)
  }

  return (
    <div>
      <div
        ref={list}
        role="tablist"
        tabIndex={-1}
        aria-label={label}
        onKeyDown={handleKeyDown}
        className="no-print flex gap-1 overflow-x-auto border-b border-hairline"
      >
        {tabs.map((tab, index) => (
          <button
            key={tab.id}
            type="button"
            role="tab"
            id={`${baseId}-tab-${tab.id}`}
            aria-controls={`${baseId}-panel`}
            aria-selected={tab === current}
            tabIndex={tab === current ? 0 : -1}
            onClick={() => select(index)}
            className={classNames(
              '-mb-px border-b-3 px-3 py-2 font-semibold whitespace-nowrap -outline-offset-2!',
              tab === current ? 'border-chestnut text-ink' : 'border-transparent text-slate hover:text-ink',
            )}
          >
            {tab.label}
          </button>
        ))}
      </div>
      <div
        id={`${baseId}-panel`}
        role="tabpanel"
        aria-labelledby={`${baseId}-tab-${current?.id ?? ''}`}
        className="pt-4"
      >
        {current?.content}
      </div>
    </div>
  )
}
