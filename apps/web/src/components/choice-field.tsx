import type { ComponentProps, ReactNode } from 'react'
import { FieldError, FieldShell, useFieldWiring, type FieldLook } from './field-shell.tsx'

export type Choice = { value: string; label: string }

export type SelectFieldProps = FieldLook &
  Omit<ComponentProps<'select'>, 'className' | 'id' | 'name' | 'children'> & {
    choices: readonly Choice[]
    /** The first, empty choice, for example "Choose a station". */
    emptyLabel?: string
  }

export function SelectField({
  label,
  hint,
  error,
  optional,
  choices,
  emptyLabel,
  ...select
}: SelectFieldProps) {
  const field = useFieldWiring({ label, hint, error, name: select.name })
  return (
    <FieldShell
      id={field.wiring.id}
      label={label}
      hint={hint}
      error={field.error}
      optional={optional === true}
    >
      <select {...select} {...field.wiring} className="field-box">
        {emptyLabel !== undefined && <option value="">{emptyLabel}</option>}
        {choices.map((choice) => (
          <option key={choice.value} value={choice.value}>
            {choice.label}
          </option>
        ))}
      </select>
    </FieldShell>
  )
}

export type CheckboxFieldProps = FieldLook &
  Omit<ComponentProps<'input'>, 'className' | 'id' | 'name' | 'type'>

export function CheckboxField({ label, hint, error, optional: _, ...input }: CheckboxFieldProps) {
  const field = useFieldWiring({ label, hint, error, name: input.name })
  const { id } = field.wiring
  return (
    <div className="grid gap-1">
      <div className="flex items-start gap-2.5">
        <input
          {...input}
          {...field.wiring}
          type="checkbox"
          className="mt-1 size-4.5 shrink-0 accent-action"
        />
        <label htmlFor={id}>{label}</label>
      </div>
      {hint !== undefined && (
        <div id={`${id}-hint`} className="pl-7 text-sm text-slate">
          {hint}
        </div>
      )}
      <FieldError id={`${id}-error`} error={field.error} />
    </div>
  )
}

export type ChoiceGroupProps = {
  legend: ReactNode
  hint?: ReactNode
  error?: string | undefined
  /** Name of a form field whose errors concern the whole group. */
  name?: string
  /** CheckboxFields or RadioFields. */
  children: ReactNode
}

/** Several checkboxes or radio buttons that answer one question. */
export function ChoiceGroup({ legend, hint, error, name, children }: ChoiceGroupProps) {
  const field = useFieldWiring({ label: legend, hint, error, name })
  const { id } = field.wiring
  return (
    <fieldset className="grid gap-2" aria-describedby={field.wiring['aria-describedby']}>
      <legend className="mb-1 font-semibold">{legend}</legend>
      {hint !== undefined && (
        <div id={`${id}-hint`} className="text-sm text-slate">
          {hint}
        </div>
      )}
      {children}
      <FieldError id={`${id}-error`} error={field.error} />
    </fieldset>
  )
}

export type RadioFieldProps = Omit<ComponentProps<'input'>, 'className' | 'type'> & { label: ReactNode }

export function RadioField({ label, ...input }: RadioFieldProps) {
  return (
    <label className="flex items-start gap-2.5">
      <input {...input} type="radio" className="mt-1 size-4.5 shrink-0 accent-action" />
      <span>{label}</span>
    </label>
  )
}
