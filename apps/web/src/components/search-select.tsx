import { useEffect, useEffectEvent, useId, useState, type KeyboardEvent } from 'react'
import { classNames } from '../lib/class-names.ts'
import { FieldShell, useFieldWiring, type FieldLook } from './field-shell.tsx'

export type SearchOption = { id: string; label: string; detail?: string | undefined }

export type SearchSelectProps = FieldLook & {
  selected: SearchOption | null
  onSelect: (option: SearchOption | null) => void
  /** What the server found for the last text given to `onSearch`. */
  options: readonly SearchOption[]
  isFetching: boolean
  onSearch: (text: string) => void
  onBlur?: () => void
  placeholder?: string
  disabled?: boolean
}

const TYPING_PAUSE_MS = 250

/** Chooses one of many by typing part of its name; a combobox after the ARIA authoring practices. */
export function SearchSelect(props: SearchSelectProps) {
  const { label, hint, error, name, optional, selected, onSelect, options } = props
  const field = useFieldWiring({ label, hint, error, name })
  const listId = useId()
  const [draft, setDraft] = useState<string | null>(null)
  const [activeIndex, setActiveIndex] = useState(0)
  const isOpen = draft !== null
  const active = options[activeIndex]

  const search = useEffectEvent((text: string) => props.onSearch(text))
  useEffect(() => {
    if (draft === null) return
    const timer = setTimeout(() => search(draft.trim()), TYPING_PAUSE_MS)
    return () => clearTimeout(timer)
  }, [draft])

  const choose = (option: SearchOption | null) => {
    onSelect(option)
    setDraft(null)
  }
  const open = (text: string) => {
    setDraft(text)
    setActiveIndex(0)
  }
  const handleKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
      event.preventDefault()
      if (!isOpen) open('')
      else setActiveIndex(stepIndex(activeIndex, event.key === 'ArrowDown' ? 1 : -1, options.length))
    } else if (event.key === 'Enter' && isOpen) {
      event.preventDefault()
      if (active !== undefined) choose(active)
    } else if (event.key === 'Escape' && isOpen) {
      event.preventDefault()
      setDraft(null)
    }
  }
  const handleBlur = () => {
    if (draft === '' && optional === true) onSelect(null)
    setDraft(null)
    props.onBlur?.()
  }

  return (
    <FieldShell
      id={field.wiring.id}
      label={label}
      hint={hint}
      error={field.error}
      optional={optional === true}
    >
      <div className="relative">
        <input
          {...field.wiring}
          type="text"
          role="combobox"
          autoComplete="off"
          aria-expanded={isOpen}
          aria-controls={listId}
          aria-autocomplete="list"
          aria-activedescendant={isOpen && active !== undefined ? `${listId}-${active.id}` : undefined}
          placeholder={props.placeholder}
          disabled={props.disabled}
          value={draft ?? selected?.label ?? ''}
          onChange={(event) => open(event.currentTarget.value)}
          onClick={() => {
            if (!isOpen) open('')
          }}
          onKeyDown={handleKeyDown}
          onBlur={handleBlur}
          className="field-box placeholder:text-slate"
        />
        <OptionList
          id={listId}
          label={label}
          isOpen={isOpen}
          isFetching={props.isFetching}
          options={options}
          activeIndex={activeIndex}
          onChoose={choose}
        />
      </div>
    </FieldShell>
  )
}

function stepIndex(index: number, step: number, count: number): number {
  return count === 0 ? 0 : (index + step + count) % count
}

type OptionListProps = Pick<SearchSelectProps, 'label' | 'options' | 'isFetching'> & {
  id: string
  isOpen: boolean
  activeIndex: number
  onChoose: (option: SearchOption) => void
}

function OptionList({ id, label, isOpen, isFetching, options, activeIndex, onChoose }: OptionListProps) {
  return (
    <div
      hidden={!isOpen}
      className="absolute inset-x-0 top-full z-20 mt-1 max-h-72 min-w-56 overflow-y-auto border border-edge bg-sheet shadow-lift"
    >
      <ul id={id} role="listbox" aria-label={typeof label === 'string' ? label : 'Choices'}>
        {options.map((option, index) => (
          // The input keeps the focus and has the keys; the list only takes the pointer.
          // eslint-disable-next-line jsx-a11y/click-events-have-key-events -- the comment above
          <li
            key={option.id}
            id={`${id}-${option.id}`}
            role="option"
            aria-selected={index === activeIndex}
            // A press would blur the input, which closes the list before the click arrives.
            onMouseDown={(event) => event.preventDefault()}
            onClick={() => onChoose(option)}
            className={classNames(
              'cursor-pointer px-3 py-1.5 hover:bg-band',
              index === activeIndex && 'bg-band-strong',
            )}
          >
            {option.label}
            {option.detail !== undefined && (
              <span className="block text-sm text-slate">{option.detail}</span>
            )}
          </li>
        ))}
      </ul>
      {options.length === 0 && (
        <p role="status" className="px-3 py-2 text-slate">
          {isFetching ? 'Searching…' : 'Nothing found. Try another part of the name.'}
        </p>
      )}
    </div>
  )
}
