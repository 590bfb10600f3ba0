import { z } from 'zod'

const violationCodes = {
  '23502': 'not-null',
  '23503': 'foreign-key',
  '23505': 'unique',
  '23514': 'check',
  '23P01': 'exclusion',
  '23001': 'append-only',
} as const

export type ConstraintKind = (typeof violationCodes)[keyof typeof violationCodes]

const postgresErrorSchema = z.object({
  code: z.string(),
  constraint: z.string().optional(),
  table: z.string().optional(),
})

/** PostgreSQL refused a row: which constraint, so that a service can say it in words at the right field. */
export class ConstraintViolation extends Error {
  readonly kind: ConstraintKind
  readonly constraint: string
  readonly table: string

  constructor(details: { kind: ConstraintKind; constraint: string; table: string; cause: unknown }) {
    super(`${details.kind} constraint ${details.constraint} of ${details.table} refused a row`, {
      cause: details.cause,
    })
    this.name = 'ConstraintViolation'
    this.kind = details.kind
    this.constraint = details.constraint
    this.table = details.table
  }
}

function isViolationCode(code: string): code is keyof typeof violationCodes {
  return Object.hasOwn(violationCodes, code)
}

/** Turns a driver error into a {@link ConstraintViolation}; every other error comes back as it was. */
export function translateDatabaseError(error: unknown): unknown {
  if (error instanceof ConstraintViolation) return error
  const parsed = postgresErrorSchema.safeParse(error)
  if (!parsed.success || !isViolationCode(parsed.data.code)) return error
  return new ConstraintViolation({
    kind: violationCodes[parsed.data.code],
    constraint: parsed.data.constraint ?? '',
    table: parsed.data.table ?? '',
    cause: error,
  })
}

/** True when `error` is the refusal of exactly this constraint, before or after translation. */
export function violates(error: unknown, constraint: string): boolean {
  const translated = translateDatabaseError(error)
  return translated instanceof ConstraintViolation && translated.constraint === constraint
}
