import type { SessionId } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import type { Request } from 'express'
import type { Logger } from 'pino'

/** Somebody signed in, and the session they use. */
export type SignedIn = { actor: Actor; sessionId: SessionId }

/** What middleware has found out about a request, before its route runs. */
export type RequestContext = {
  correlationId: string
  logger: Logger
  uploadDirectory: string
  uploadLimitBytes: number
  /** Null when nobody is signed in; throws when a session was claimed but is not good. */
  signedIn: () => Promise<SignedIn | null>
  /** @throws AppError csrf-failed */
  checkOrigin: () => void
  /** @throws AppError csrf-failed */
  checkCsrf: (sessionId: SessionId) => void
}

const contexts = new WeakMap<Request, RequestContext>()

export function setRequestContext(request: Request, context: RequestContext): void {
  contexts.set(request, context)
}

/** @throws Error when the middleware that sets it has not run: a mistake in build-app.ts */
export function requestContext(request: Request): RequestContext {
  const context = contexts.get(request)
  if (context === undefined) throw new Error('The request has no context; build-app.ts must set it first')
  return context
}

/** For error answers, which may be needed before there is a context. */
export function requestContextIfAny(request: Request): RequestContext | undefined {
  return contexts.get(request)
}
