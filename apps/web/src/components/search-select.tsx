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
}

const TYPING_PAUSE_MS = 250

/** The text being typed, null while the list is closed; searching waits for a pause in the typing. */
function useDraft(onSearch: (text: string) => void) {
  const [draft, setDraft] = useState<string | null>(null)
  const search = useEffectEvent((text: string) => onSearch(text))
  useEffect(() => {
    if (draft === null) return
    const timer = setTimeout(() => search(draft.trim()), TYPING_PAUSE_MS)
    return () => clearTimeout(timer)
  }, [draft])
  return [draft, setDraft] as const
}

/** Chooses one of many by typing part of its name; a combobox after the ARIA authoring practices. */
export function SearchSelect(props: SearchSelectProps) {
  const { label, hint, error, name, optional, selected, onSelect, options } = props
  const field = useFieldWiring({ label, hint, error, name })
  const listId = useId()
  // What is chosen already does not narrow the choices.
  const [draft, setDraft] = useDraft((text) => props.onSearch(text === selected?.label ? '' : text))
  const [activeIndex, setActiveIndex] = useState(0)
  const isOpen = draft !== null
  const active = options[activeIndex]

  const choose = (option: SearchOption | null) => {
    onSelect(option)
    setDraft(null)
  }
  const open = (text: string) => {
    setDraft(text)
    setActiveIndex(0)
  }
  const openAsIs = () => open(selected?.label ?? '')
  const handleKeyDown = (event: KeyboardEvent) => {
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key]
    if (step === undefined && !(isOpen && (event.key === 'Enter' || event.key === 'Escape'))) return
    event.preventDefault()
    if (step !== undefined && isOpen) setActiveIndex(stepIndex(activeIndex, step, options.length))
    else if (step !== undefined) openAsIs()
    else if (event.key === 'Escape') setDraft(null)
    else if (active !== undefined) choose(active)
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
          value={draft ?? selected?.label ?? ''}
          onChange={(event) => open(event.currentTarget.value)}
          onClick={(event) => {
            if (isOpen) return
            openAsIs()
            event.currentTarget.select()
          }}
          onKeyDown={handleKeyDown}
          onBlur={handleBlur}
          className="field-box placeholder:text-slate"
        />
        <OptionList {...props} id={listId} isOpen={isOpen} activeIndex={activeIndex} onChoose={choose} />
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
      <div id={id} role="listbox" tabIndex={-1} aria-label={typeof label === 'string' ? label : 'Choices'}>
        {options.map((option, index) => (
          // The input keeps the focus and has the keys; the list only takes the pointer.
          // eslint-disable-next-line jsx-a11y/click-events-have-key-events -- the comment above
          <div
            key={option.id}
            id={`${id}-${option.id}`}
            role="option"
            tabIndex={-1}
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
            {option.detail !== undefined && <span className="block text-sm text-slate">{option.detail}</span>}
          </div>
        ))}
      </div>
      {options.length === 0 && (
        <p role="status" className="px-3 py-2 text-slate">
          {isFetching ? 'Searching…' : 'Nothing found. Try another part of the name.'}
        </p>
      )}
    </div>
  )
}
