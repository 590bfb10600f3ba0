import type { FieldError } from '@fieldfare/contracts'
import type { FieldValues, Path } from 'react-hook-form'

function isPath<Values extends FieldValues>(values: Values, path: string): path is Path<Values> {
  let here: unknown = values
  for (const key of path.split('.')) {
    if (typeof here !== 'object' || here === null || !Object.hasOwn(here, key)) return false
    here = Object.entries(here).find(([name]) => name === key)?.[1]
  }
  return true
}

/**
 * Finds the field of each of the server's complaints and hands it on, the first with the wish to be focused.
 * Returns how many found a field; the rest must be told elsewhere.
 */
export function placeFieldErrors<Values extends FieldValues>(
  values: Values,
  fieldErrors: readonly FieldError[],
  place: (name: Path<Values>, message: string, shouldFocus: boolean) => void,
): number {
  let placed = 0
  for (const { path, message } of fieldErrors) {
    // The server says where in the request a value stood; the form knows only what is in the body.
    const name = path.replace(/^body\./, '')
    if (!isPath(values, name)) continue
    place(name, message, placed === 0)
    placed += 1
  }
  return placed
}
