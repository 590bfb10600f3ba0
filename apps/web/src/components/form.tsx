import { zodResolver } from '@hookform/resolvers/zod'
import { useState, type ReactNode } from 'react'
import { get, useForm, type FieldValues, type UseFormProps, type UseFormReturn } from 'react-hook-form'
import type { z } from 'zod'
import { isApiProblem } from '../lib/api-problem.ts'
import { placeFieldErrors } from '../lib/form-problems.ts'
import { FieldErrorsContext } from './field-shell.tsx'
import { ErrorState } from './states.tsx'
import { UnsavedGuard } from './unsaved-guard.tsx'

export type ContractForm<Input extends FieldValues, Output> = UseFormReturn<Input, unknown, Output>

/** A form whose rules are those of the contract's schema; errors show after a field was left or the form was sent. */
export function useContractForm<Input extends FieldValues, Output>(
  schema: z.ZodType<Output, Input>,
  options: Omit<UseFormProps<Input, unknown, Output>, 'resolver'>,
): ContractForm<Input, Output> {
  return useForm<Input, unknown, Output>({ mode: 'onTouched', ...options, resolver: zodResolver(schema) })
}

export type FormProps<Input extends FieldValues, Output> = {
  form: ContractForm<Input, Output>
  /** Throws ApiProblem to refuse: field errors go to their fields, the rest above the buttons. */
  onSubmit: (values: Output) => Promise<unknown>
  children: ReactNode
  actions: ReactNode
  /** Ask before leaving with unsaved changes; off for sign-in and filters. */
  guard?: boolean
}

/** Form with errors at the fields, the server's included, and a guard for what is not saved yet. */
export function Form<Input extends FieldValues, Output>({
  form,
  onSubmit,
  children,
  actions,
  guard = true,
}: FormProps<Input, Output>) {
  const [failure, setFailure] = useState<unknown>(null)
  const { errors, isDirty, isSubmitting, isSubmitSuccessful } = form.formState

  const submit = form.handleSubmit(async (values) => {
    setFailure(null)
    try {
      await onSubmit(values)
    } catch (error) {
      const fieldErrors = isApiProblem(error) ? error.fieldErrors : []
      const placed = placeFieldErrors(form.getValues(), fieldErrors, (name, message, shouldFocus) =>
        form.setError(name, { type: 'server', message }, { shouldFocus }),
      )
      if (placed < fieldErrors.length || fieldErrors.length === 0) setFailure(error)
      // A refused form is not submitted: the guard must go on watching it.
      if (placed === 0) form.setError('root.server', { type: 'server' })
    }
  })

  const errorOf = (name: string): string | undefined => {
    const found: unknown = get(errors, name)
    return readMessage(found)
  }

  return (
    <FieldErrorsContext value={errorOf}>
      <form noValidate onSubmit={(event) => void submit(event)} className="grid max-w-2xl gap-5">
        {children}
        {failure !== null && <ErrorState error={failure} />}
        <div className="flex flex-wrap gap-2 pt-1">{actions}</div>
      </form>
      {guard && <UnsavedGuard isDirty={isDirty && !isSubmitting && !isSubmitSuccessful} />}
    </FieldErrorsContext>
  )
}

/** The message of a field, or of its group where a rule concerns the whole of it (`root`). */
function readMessage(error: unknown): string | undefined {
  if (typeof error !== 'object' || error === null) return undefined
  if ('message' in error && typeof error.message === 'string' && error.message !== '') return error.message
  return 'root' in error ? readMessage(error.root) : undefined
}
