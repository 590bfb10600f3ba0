import { problemKinds, type Problem } from '@fieldfare/contracts'
import { ConstraintViolation, translateDatabaseError } from '@fieldfare/database'
import type { NextFunction, Request, Response } from 'express'
import { z } from 'zod'
import { AppError } from '../http/app-error.ts'
import { requestContextIfAny } from '../http/request-context.ts'

const bodyErrorSchema = z.object({ type: z.string(), status: z.number() })
const statusErrorSchema = z.object({ status: z.literal([400, 404]) })

/** What Express and its body parser throw, in our words. */
function fromHttpError(error: unknown): AppError | null {
  const body = bodyErrorSchema.safeParse(error)
  if (body.success) {
    if (body.data.type === 'entity.too.large') {
      return new AppError('file-too-large', {
        detail: 'The request carries more than 1 MB of text.',
        cause: error,
      })
    }
    if (body.data.status < 500) {
      return new AppError('malformed-request', {
        detail: 'The request does not carry readable JSON.',
        cause: error,
      })
    }
  }
  // The router answers 400 for an address with a broken percent sign, the file server 404.
  const status = statusErrorSchema.safeParse(error).data?.status
  if (status === 400) {
    return new AppError('malformed-request', { detail: 'The address cannot be read.', cause: error })
  }
  return status === 404 ? new AppError('not-found', { detail: 'There is no such file.', cause: error }) : null
}

function fromDatabaseError(error: unknown): AppError | null {
  const violation = translateDatabaseError(error)
  if (!(violation instanceof ConstraintViolation)) return null
  if (violation.kind === 'check' || violation.kind === 'not-null' || violation.kind === 'append-only')
    return null
  return new AppError('conflict', {
    detail: 'This conflicts with something that was entered or removed meanwhile. Load the page again.',
    logMessage: violation.message,
    cause: error,
  })
}

/** Errors nobody foresaw say nothing of themselves: the correlation id leads to the log. */
function toAppError(error: unknown): AppError {
  if (error instanceof AppError) return error
  return (
    fromHttpError(error) ??
    fromDatabaseError(error) ??
    new AppError('internal-error', {
      detail:
        'Something went wrong on our side. Try again; if it stays, tell your administrator the number below.',
      logMessage: error instanceof Error ? error.message : 'something that is no error was thrown',
      cause: error,
    })
  )
}

function problemOf(error: AppError, correlationId: string): Problem {
  const { status, title } = problemKinds[error.code]
  return {
    type: `urn:fieldfare:problem:${error.code}`,
    code: error.code,
    title,
    status,
    detail: error.detail,
    correlationId,
    fieldErrors: [...error.fieldErrors],
    ...(error.retryAfterSeconds === undefined ? {} : { retryAfterSeconds: error.retryAfterSeconds }),
  }
}

/** The one place where a failed request gets its answer (RFC 9457) and, when it is our fault, its log line. */
export function answerProblem(
  error: unknown,
  request: Request,
  response: Response,
  next: NextFunction,
): void {
  const context = requestContextIfAny(request)
  const appError = toAppError(error)
  const problem = problemOf(appError, context?.correlationId ?? 'none')
  const log = context?.logger
  if (problem.status >= 500)
    log?.error({ err: appError.cause ?? appError, code: problem.code }, appError.message)
  else log?.info({ code: problem.code }, appError.message)
  if (response.headersSent) {
    // Too late to say it in words: break off, so that a cut file is not taken for a whole one.
    next(error)
    return
  }
  if (problem.retryAfterSeconds !== undefined) response.setHeader('retry-after', problem.retryAfterSeconds)
  response.status(problem.status).setHeader('cache-control', 'no-store')
  response.type('application/problem+json').send(JSON.stringify(problem))
}
