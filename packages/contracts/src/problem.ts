import { z } from 'zod'

/** Every way a request can fail, with its HTTP status and the title people see (RFC 9457). */
export const problemKinds = {
  'validation-failed': { status: 422, title: 'Some fields need attention' },
  'malformed-request': { status: 400, title: 'The request could not be read' },
  'not-signed-in': { status: 401, title: 'Please sign in' },
  'sign-in-failed': { status: 401, title: 'E-mail address or password is not right' },
  'too-many-attempts': { status: 429, title: 'Too many attempts' },
  'not-allowed': { status: 403, title: 'This is not open to you' },
  'csrf-failed': { status: 403, title: 'The request did not come from this application' },
  'not-found': { status: 404, title: 'Not found' },
  'method-not-allowed': { status: 405, title: 'This address does not take that request' },
  'link-expired': { status: 410, title: 'This link has expired or was used already' },
  conflict: { status: 409, title: 'This conflicts with what is held already' },
  'duplicate-log': { status: 409, title: 'This recording is held already' },
  'overlapping-log': { status: 409, title: 'This recording overlaps one that is held' },
  'month-closed': { status: 409, title: 'The month is closed' },
  'second-person-needed': { status: 403, title: 'A second person must do this' },
  'file-refused': { status: 422, title: 'The file cannot be used' },
  'file-too-large': { status: 413, title: 'The file is too large' },
  'local-time-invalid': { status: 422, title: 'That local time needs a decision' },
  'audio-expired': { status: 410, title: 'The audio is no longer kept' },
  unavailable: { status: 503, title: 'The service is not ready' },
  'internal-error': { status: 500, title: 'Something went wrong on our side' },
} as const satisfies Record<string, { status: number; title: string }>

export type ProblemCode = keyof typeof problemKinds

function isProblemCode(code: string): code is ProblemCode {
  return Object.hasOwn(problemKinds, code)
}

export const problemCodeSchema = z.string().refine(isProblemCode)

/** One complaint about one field; `path` uses dots and indexes: shares.2.percent. */
export const fieldErrorSchema = z.object({ path: z.string(), message: z.string() })
export type FieldError = z.infer<typeof fieldErrorSchema>

/** RFC 9457 problem document, the one shape of every error answer (application/problem+json). */
export const problemSchema = z.object({
  type: z.string(),
  code: problemCodeSchema,
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  instance: z.string().optional(),
  correlationId: z.string(),
  fieldErrors: z.array(fieldErrorSchema).default([]),
  retryAfterSeconds: z.number().optional(),
})
export type Problem = z.infer<typeof problemSchema>

/** Turns zod issues into field errors, all of them, since a form needs every complaint at once. */
export function fieldErrorsFrom(error: z.ZodError, prefix = ''): FieldError[] {
  return error.issues.map((issue) => ({
    path: [prefix, ...issue.path.map(String)].filter((part) => part !== '').join('.'),
    message: issue.message,
  }))
}
