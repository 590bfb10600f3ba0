import type { FieldError } from '@fieldfare/contracts'
import type { FieldValues, Path } from 'react-hook-form'

/** The parts of a form this needs, so that it can be tested without one. */
export type ErrorTarget<Values extends FieldValues> = {
  getValues: () => Values
  setError: (
    name: Path<Values>,
    error: { type: string; message: string },
    options: { shouldFocus: boolean },
  ) => void
}

function isPath<Values extends FieldValues>(values: Values, path: string): path is Path<Values> {
  let here: unknown = values
  for (const key of path.split('.')) {
    if (typeof here !== 'object' || here === null || !Object.hasOwn(here, key)) return false
    here = Object.entries(here).find(([name]) => name === key)?.[1]
  }
  return true
}

/**
 * Puts the server's complaints at the fields they name and focuses the first.
 * Returns how many found a field; the rest must be told elsewhere.
 */
export function applyFieldErrors<Values extends FieldValues>(
  form: ErrorTarget<Values>,
  fieldErrors: readonly FieldError[],
): number {
  const values = form.getValues()
  let placed = 0
  for (const { path, message } of fieldErrors) {
    // The server says where in the request a value stood; the form knows only what is in the body.
    const name = path.replace(/^body\./, '')
    if (!isPath(values, name)) continue
    form.setError(name, { type: 'server', message }, { shouldFocus: placed === 0 })
    placed += 1
  }
  return placed
}
