import { problemKinds, type FieldError, type ProblemCode } from '@fieldfare/contracts'

export type AppErrorDetails = {
  /** Whole sentences for the person: what happened and what to do. */
  detail?: string
  fieldErrors?: readonly FieldError[]
  retryAfterSeconds?: number
  /** For the log only; never leaves the server. */
  logMessage?: string
  cause?: unknown
}

/** Every expected failure of a request: a code from the contracts, words for the person, a message for the log. */
export class AppError extends Error {
  readonly code: ProblemCode
  readonly detail: string
  readonly fieldErrors: readonly FieldError[]
  readonly retryAfterSeconds: number | undefined

  constructor(code: ProblemCode, details: AppErrorDetails = {}) {
    super(details.logMessage ?? details.detail ?? problemKinds[code].title, { cause: details.cause })
    this.name = 'AppError'
    this.code = code
    this.detail = details.detail ?? `${problemKinds[code].title}.`
    this.fieldErrors = details.fieldErrors ?? []
    this.retryAfterSeconds = details.retryAfterSeconds
  }
}

/** `subject` as in a sentence: "This station". Rows out of scope answer the same, so nobody learns what exists. */
export function notFound(subject: string): AppError {
  return new AppError('not-found', { detail: `${subject} does not exist, or is not open to you.` })
}

export function conflict(detail: string): AppError {
  return new AppError('conflict', { detail })
}

export function notAllowed(detail: string): AppError {
  return new AppError('not-allowed', { detail })
}

/** All complaints at once, each at its field. */
export function validationFailed(fieldErrors: readonly FieldError[]): AppError {
  return new AppError('validation-failed', { detail: 'Check the fields named below.', fieldErrors })
}

/** One complaint at one field. */
export function fieldRefused(path: string, message: string): AppError {
  return validationFailed([{ path, message }])
}
