import type { ComponentProps } from 'react'
import { classNames } from '../lib/class-names.ts'
import { FieldShell, useFieldWiring, type FieldLook } from './field-shell.tsx'

export type TextFieldProps = FieldLook &
  Omit<ComponentProps<'input'>, 'className' | 'id' | 'name'> & {
    /** Monospace for codes and amounts. */
    code?: boolean
  }

export function TextField({ label, hint, error, optional, code = false, ...input }: TextFieldProps) {
  const field = useFieldWiring({ label, hint, error, name: input.name })
  return (
    <FieldShell
      id={field.wiring.id}
      label={label}
      hint={hint}
      error={field.error}
      optional={optional === true}
    >
      <input
        type="text"
        {...input}
        {...field.wiring}
        className={classNames('field-box', code && 'font-mono')}
      />
    </FieldShell>
  )
}

export type DateTimeFieldProps = FieldLook &
  Omit<ComponentProps<'input'>, 'className' | 'id' | 'name' | 'type'> & {
    kind?: 'datetime-local' | 'date' | 'month' | 'time'
    /** Shown behind the field: a wall-clock time means nothing without its zone. */
    timeZone?: string
  }

/** A station-local date and time; `step={1}` asks for seconds. */
export function DateTimeField({
  label,
  hint,
  error,
  optional,
  kind = 'datetime-local',
  timeZone,
  ...input
}: DateTimeFieldProps) {
  const field = useFieldWiring({ label, hint, error, name: input.name })
  return (
    <FieldShell
      id={field.wiring.id}
      label={label}
      hint={hint}
      error={field.error}
      optional={optional === true}
    >
      <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
        <input {...input} {...field.wiring} type={kind} className="field-box max-w-72 font-mono" />
        {timeZone !== undefined && <span className="text-sm text-slate">Time zone {timeZone}</span>}
      </div>
    </FieldShell>
  )
}

export type TextAreaFieldProps = FieldLook & Omit<ComponentProps<'textarea'>, 'className' | 'id' | 'name'>

export function TextAreaField({ label, hint, error, optional, rows = 4, ...input }: TextAreaFieldProps) {
  const field = useFieldWiring({ label, hint, error, name: input.name })
  return (
    <FieldShell
      id={field.wiring.id}
      label={label}
      hint={hint}
      error={field.error}
      optional={optional === true}
    >
      <textarea rows={rows} {...input} {...field.wiring} className="field-box" />
    </FieldShell>
  )
}
