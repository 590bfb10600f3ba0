import { randomUUID } from 'node:crypto'
import type { SessionId } from '@fieldfare/contracts'
import { findSessionActor, touchSession } from '@fieldfare/database'
import type { NextFunction, Request, Response } from 'express'
import { AppError } from '../http/app-error.ts'
import { readCookie } from '../http/cookie-jar.ts'
import type { Dependencies } from '../http/dependencies.ts'
import { setRequestContext, type SignedIn } from '../http/request-context.ts'
import { ACCESS_COOKIE, CSRF_COOKIE, CSRF_HEADER } from '../http/session-cookies.ts'
import { createSessionTokens, isSameText, type SessionTokens } from '../http/session-tokens.ts'

const CORRELATION_HEADER = 'x-correlation-id'
const CORRELATION_ID = /^[A-Za-z0-9-]{8,64}$/

/** A proxy's own id is kept, so that its log and ours can be laid side by side. */
function correlationIdOf(request: Request): string {
  const given = request.get(CORRELATION_HEADER) ?? ''
  return CORRELATION_ID.test(given) ? given : randomUUID()
}

/** The token names a session; who that is, and whether it still runs, is asked of the database each time. */
async function readSignedIn(
  request: Request,
  dependencies: Dependencies,
  tokens: SessionTokens,
): Promise<SignedIn | null> {
  const token = readCookie(request, ACCESS_COOKIE)
  if (token === null) return null
  const claims = tokens.readAccessToken(token, dependencies.clock())
  if (claims === null) return null
  const actor = await findSessionActor(dependencies.database, claims.sessionId)
  if (actor?.userId !== claims.userId) return null
  await touchSession(dependencies.database, claims.sessionId)
  return { actor, sessionId: claims.sessionId }
}

function csrfFailed(logMessage: string): AppError {
  return new AppError('csrf-failed', {
    detail: 'The request did not come from this application’s own pages. Load the page again and retry.',
    logMessage,
  })
}

/** Browsers name the page's origin on every unsafe request; programs without a browser name none. */
function checkOrigin(request: Request, publicUrl: string): void {
  if (request.get('sec-fetch-site') === 'cross-site')
    throw csrfFailed('the browser says the request is cross-site')
  const origin = request.get('origin')
  if (origin === undefined) return
  const isOurs = origin === new URL(publicUrl).origin || hostOf(origin) === request.get('host')
  if (!isOurs) throw csrfFailed('the origin is not ours')
}

function hostOf(origin: string): string | null {
  try {
    return new URL(origin).host
  } catch {
    return null
  }
}

/** The header repeats the cookie, and both belong to this very session. */
function checkCsrf(request: Request, tokens: SessionTokens, sessionId: SessionId): void {
  const header = request.get(CSRF_HEADER) ?? ''
  const cookie = readCookie(request, CSRF_COOKIE) ?? ''
  if (header === '' || cookie === '' || !isSameText(header, cookie)) {
    throw csrfFailed('the CSRF header does not repeat the cookie')
  }
  if (!tokens.isCsrfTokenOf(header, sessionId)) throw csrfFailed('the CSRF token is not of this session')
}

/** Prepares what routes ask of a request. Nothing is looked up until a route asks. */
export function provideContext(dependencies: Dependencies) {
  const { configuration, logger } = dependencies
  const tokens = createSessionTokens(configuration.tokenSecret)
  return (request: Request, response: Response, next: NextFunction): void => {
    const correlationId = correlationIdOf(request)
    response.setHeader(CORRELATION_HEADER, correlationId)
    setRequestContext(request, {
      correlationId,
      logger: logger.child({ correlationId }),
      uploadDirectory: configuration.uploadDirectory,
      uploadLimitBytes: configuration.uploadLimitBytes,
      signedIn: () => readSignedIn(request, dependencies, tokens),
      checkOrigin: () => checkOrigin(request, configuration.publicUrl),
      checkCsrf: (sessionId) => checkCsrf(request, tokens, sessionId),
    })
    next()
  }
}
