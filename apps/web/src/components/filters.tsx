import { Search, X } from 'lucide-react'
import { useEffect, useEffectEvent, useId, useState, type ReactNode } from 'react'
import type { ListSearch } from '../lib/list-search.ts'
import { Button } from './button.tsx'
import type { Choice } from './choice-field.tsx'

export type FilterBarProps = {
  search: Pick<ListSearch, 'hasFilters' | 'clearFilters'>
  children: ReactNode
}

/** Filters above a list in one row, with a way to drop them all. */
export function FilterBar({ search, children }: FilterBarProps) {
  return (
    <search className="no-print mb-4 flex flex-wrap items-end gap-3">
      {children}
      {search.hasFilters && (
        <Button tone="quiet" icon={X} onClick={search.clearFilters}>
          Clear filters
        </Button>
      )}
    </search>
  )
}

type FilterProps = { label: string; value: string; onChange: (value: string) => void }

const TYPING_PAUSE_MS = 300

/** Free text; asks the server once typing pauses. */
export function SearchFilter({
  label,
  value,
  onChange,
  placeholder,
}: FilterProps & { placeholder?: string }) {
  const id = useId()
  const [draft, setDraft] = useState(value)
  const [shownValue, setShownValue] = useState(value)
  // The address changed by other means (back, clear): take that over.
  if (shownValue !== value) {
    setShownValue(value)
    setDraft(value)
  }

  const send = useEffectEvent(() => {
    if (draft.trim() !== value) onChange(draft.trim())
  })
  useEffect(() => {
    const timer = setTimeout(() => send(), TYPING_PAUSE_MS)
    return () => clearTimeout(timer)
  }, [draft])

  return (
    <div className="grid w-full gap-1 sm:w-64">
      <label htmlFor={id} className="overline-label">
        {label}
      </label>
      <div className="relative">
        <Search aria-hidden className="absolute top-1/2 left-2.5 size-4 -translate-y-1/2 text-slate" />
        <input
          id={id}
          type="search"
          value={draft}
          placeholder={placeholder}
          onChange={(event) => setDraft(event.currentTarget.value)}
          className="field-box pl-8 placeholder:text-slate"
        />
      </div>
    </div>
  )
}

export function SelectFilter({
  label,
  value,
  onChange,
  choices,
  allLabel,
}: FilterProps & { choices: readonly Choice[]; allLabel: string }) {
  const id = useId()
  return (
    <div className="grid min-w-36 gap-1 max-sm:grow">
      <label htmlFor={id} className="overline-label">
        {label}
      </label>
      <select
        id={id}
        value={value}
        onChange={(event) => onChange(event.currentTarget.value)}
        className="field-box"
      >
        <option value="">{allLabel}</option>
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
      </select>
    </div>
  )
}

/** A month or a day. */
export function DateFilter({ label, value, onChange, kind }: FilterProps & { kind: 'month' | 'date' }) {
  const id = useId()
  return (
    <div className="grid gap-1">
      <label htmlFor={id} className="overline-label">
        {label}
      </label>
      <input
        id={id}
        type={kind}
        value={value}
        onChange={(event) => onChange(event.currentTarget.value)}
        className="field-box font-mono"
      />
    </div>
  )
}
