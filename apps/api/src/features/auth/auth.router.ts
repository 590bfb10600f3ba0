import {
  acceptInvitation,
  changePassword,
  endSession,
  getSession,
  listSessions,
  readInvitation,
  refreshSession,
  requestPasswordReset,
  resetPassword,
  signIn,
  signOut,
  signOutEverywhere,
} from '@fieldfare/contracts'
import { Router } from 'express'
import type { CookieJar } from '../../http/cookie-jar.ts'
import { AppError } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { clearSessionCookies, REFRESH_COOKIE, setSessionCookies } from '../../http/session-cookies.ts'
import { presentSession } from './auth.presenter.ts'
import { createAuthService } from './auth.service.ts'
import { createInvitationService } from './invitation.service.ts'
import { createOwnSessionsService } from './own-sessions.service.ts'
import { createPasswordResetService } from './password-reset.service.ts'
import type { OpenedSession } from './session-lifecycle.ts'

export function createAuthRouter(dependencies: Dependencies): Router {
  const auth = createAuthService(dependencies)
  const own = createOwnSessionsService(dependencies)
  const resets = createPasswordResetService(dependencies)
  const invitations = createInvitationService(dependencies, auth.lifecycle)
  const isSecure = dependencies.configuration.publicUrl.startsWith('https:')
  const forget = (cookies: CookieJar) => clearSessionCookies(cookies, isSecure)

  async function enter(opened: OpenedSession, cookies: CookieJar) {
    setSessionCookies(cookies, opened.cookies, isSecure)
    return presentSession(await auth.describeSession(opened.userId))
  }

  const router = Router()
  router.use(route(signIn, async ({ body, meta, cookies }) => enter(await auth.signIn(body, meta), cookies)))
  router.use(
    route(refreshSession, async ({ cookies }) => {
      try {
        return await enter(await auth.refresh(cookies.get(REFRESH_COOKIE)), cookies)
      } catch (error) {
        // A database that is away for a moment has not ended the session.
        if (error instanceof AppError && error.code === 'not-signed-in') forget(cookies)
        throw error
      }
    }),
  )
  router.use(route(getSession, async ({ actor }) => presentSession(await auth.describeSession(actor.userId))))
  router.use(
    route(signOut, async ({ actor, sessionId, cookies }) => {
      await own.endOwnSession(actor, sessionId, 'signed-out')
      forget(cookies)
    }),
  )
  router.use(
    route(listSessions, async ({ actor, sessionId }) => {
      const sessions = await own.listSessions(actor)
      return { items: sessions.map((session) => ({ ...session, isCurrent: session.id === sessionId })) }
    }),
  )
  router.use(
    route(endSession, async ({ actor, params }) =>
      own.endOwnSession(actor, params.sessionId, 'ended-by-user'),
    ),
  )
  router.use(
    route(signOutEverywhere, async ({ actor, cookies }) => {
      await own.signOutEverywhere(actor)
      forget(cookies)
    }),
  )
  router.use(
    route(changePassword, async ({ actor, sessionId, body, meta }) =>
      own.changePassword({ actor, sessionId, ip: meta.ip }, body),
    ),
  )
  router.use(
    route(requestPasswordReset, async ({ body, meta }) => resets.requestPasswordReset(body.email, meta.ip)),
  )
  router.use(route(resetPassword, async ({ body }) => resets.resetPassword(body)))
  router.use(route(readInvitation, async ({ body }) => invitations.readInvitation(body.token)))
  router.use(
    route(acceptInvitation, async ({ body, meta, cookies }) =>
      enter(await invitations.acceptInvitation(body, meta.userAgent), cookies),
    ),
  )
  return router
}
