import { CircleAlert } from 'lucide-react'
import { createContext, use, useId, type ReactNode } from 'react'

/** Errors of the surrounding form by field name; empty outside forms. */
export const FieldErrorsContext = createContext<(name: string) => string | undefined>(() => undefined)

export type FieldLook = {
  label: ReactNode
  hint?: ReactNode
  /** An error of your own; fields inside a Form find theirs by name. */
  error?: string | undefined
  name?: string | undefined
  /** Marks a field that may stay empty; all others are needed. */
  optional?: boolean
}

export type FieldWiring = {
  id: string
  'aria-invalid': boolean
  'aria-describedby': string | undefined
}

export function useFieldWiring({ hint, error, name }: FieldLook): {
  wiring: FieldWiring
  error: string | undefined
} {
  const id = useId()
  const errorOf = use(FieldErrorsContext)
  const shownError = error ?? (name === undefined ? undefined : errorOf(name))
  const described = [
    hint === undefined ? null : `${id}-hint`,
    shownError === undefined ? null : `${id}-error`,
  ].filter((part) => part !== null)
  return {
    wiring: {
      id,
      'aria-invalid': shownError !== undefined,
      'aria-describedby': described.length === 0 ? undefined : described.join(' '),
    },
    error: shownError,
  }
}

type FieldShellProps = Pick<FieldLook, 'label' | 'hint' | 'optional'> & {
  id: string
  error: string | undefined
  children: ReactNode
}

/** Label above, hint under it, the field, its error in words. */
export function FieldShell({ id, label, hint, optional, error, children }: FieldShellProps) {
  return (
    <div className="grid content-start gap-1">
      <label htmlFor={id} className="font-semibold">
        {label}
        {optional === true && <span className="font-normal text-slate"> (optional)</span>}
      </label>
      {hint !== undefined && (
        <div id={`${id}-hint`} className="text-sm text-slate">
          {hint}
        </div>
      )}
      {children}
      <FieldError id={`${id}-error`} error={error} />
    </div>
  )
}

export function FieldError({ id, error }: { id: string; error: string | undefined }) {
  if (error === undefined) return null
  return (
    <p id={id} className="flex items-start gap-1.5 text-sm font-semibold text-bad">
      <CircleAlert aria-hidden className="mt-0.5 size-4 shrink-0" />
      <span>{error}</span>
    </p>
  )
}
