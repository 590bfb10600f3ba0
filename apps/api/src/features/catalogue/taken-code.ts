import { AppError } from '../../http/app-error.ts'

/** A code that names one thing only is in use already: said at its field, with the thing that has it. */
export function takenCode(field: 'isrc' | 'iswc' | 'ipi', code: string, holder: string | null): AppError {
  const message = `${field.toUpperCase()} ${code} belongs to ${holder ?? 'another entry'} already.`
  return new AppError('conflict', { detail: message, fieldErrors: [{ path: field, message }] })
}
