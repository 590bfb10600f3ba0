import type { SessionId, UserId } from '@fieldfare/contracts'
import {
  endSession,
  endSessionsOfUser,
  findCredentials,
  findUser,
  inTransaction,
  listLiveSessions,
  readPasswordHash,
  readSociety,
  recordAudit,
  recordSignIn,
  updatePasswordHash,
  type Actor,
  type Society,
  type SessionRecord,
  type UserRecord,
} from '@fieldfare/database'
import { hashPassword, isPasswordRight } from '../../accounts/passwords.ts'
import { AppError, fieldRefused, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { createSessionTokens } from '../../http/session-tokens.ts'
import { createSessionLifecycle, type OpenedSession } from './session-lifecycle.ts'
import { createSignInThrottle } from './sign-in-throttle.ts'

export type Visitor = { ip: string; userAgent: string }
export type SessionDetails = { user: UserRecord; society: Society; hasLocalInbox: boolean }

export type AuthService = ReturnType<typeof createAuthService>

function sessionOver(detail: string): AppError {
  return new AppError('not-signed-in', { detail })
}

/** Signing in and out, keeping a session alive, and a person's own password. */
export function createAuthService(dependencies: Dependencies) {
  const { database, redis, configuration, clock, events } = dependencies
  const lifecycle = createSessionLifecycle({
    database,
    tokens: createSessionTokens(configuration.tokenSecret),
    clock,
  })
  const signInThrottle = createSignInThrottle(redis, 'sign-in')
  const passwordThrottle = createSignInThrottle(redis, 'change-password')

  async function describeSession(userId: UserId): Promise<SessionDetails> {
    const [user, society] = await Promise.all([findUser(database, userId), readSociety(database)])
    if (user === null) throw sessionOver('Sign in to go on.')
    return { user, society, hasLocalInbox: configuration.mail.kind === 'inbox' }
  }

  async function signIn(
    credentials: { email: string; password: string },
    visitor: Visitor,
  ): Promise<OpenedSession> {
    const person = { account: credentials.email, ip: visitor.ip }
    await signInThrottle.admit(person)
    const held = await findCredentials(database, credentials.email)
    const isRight = await isPasswordRight(credentials.password, held?.passwordHash ?? null)
    // One answer for an unknown address, a wrong password and a disabled account: nobody learns which it was.
    if (held === null || !isRight || held.status !== 'active') throw new AppError('sign-in-failed')
    await signInThrottle.forgive(person)
    return inTransaction(database, async (trx) => {
      await recordSignIn(trx, held.id)
      return lifecycle.open(trx, { userId: held.id, userAgent: visitor.userAgent })
    })
  }

  async function refresh(refreshToken: string | null): Promise<OpenedSession> {
    const outcome = refreshToken === null ? null : await lifecycle.renew(refreshToken)
    switch (outcome?.kind) {
      case 'renewed':
        return outcome.session
      case 'reused':
        throw sessionOver(
          'This session was ended for safety, because an old key to it was used. Sign in again.',
        )
      case 'unknown':
      case undefined:
        throw sessionOver('Your session has ended. Sign in again.')
    }
  }

  async function endOwnSession(
    actor: Actor,
    sessionId: SessionId,
    reason: 'signed-out' | 'ended-by-user',
  ): Promise<void> {
    const isEnded = await inTransaction(database, (trx) =>
      endSession(trx, { id: sessionId, userId: actor.userId }, reason),
    )
    if (!isEnded) throw notFound('This session')
    events.closeSessions([sessionId])
  }

  async function signOutEverywhere(actor: Actor): Promise<void> {
    const ended = await inTransaction(database, (trx) =>
      endSessionsOfUser(trx, actor.userId, 'signed-out-everywhere'),
    )
    events.closeSessions(ended)
  }

  async function changePassword(
    signedIn: { actor: Actor; sessionId: SessionId; ip: string },
    passwords: { currentPassword: string; newPassword: string },
  ): Promise<void> {
    const { actor, sessionId } = signedIn
    const person = { account: actor.userId, ip: signedIn.ip }
    await passwordThrottle.admit(person)
    const held = await readPasswordHash(database, actor.userId)
    if (!(await isPasswordRight(passwords.currentPassword, held))) {
      throw fieldRefused('currentPassword', 'This is not your present password.')
    }
    await passwordThrottle.forgive(person)
    const passwordHash = await hashPassword(passwords.newPassword, 'newPassword')
    const ended = await inTransaction(database, async (trx) => {
      await updatePasswordHash(trx, actor.userId, passwordHash)
      await recordAudit(trx, {
        actor,
        action: 'change-password',
        subjectKind: 'user',
        subjectId: actor.userId,
        summary: 'Changed the own password.',
      })
      return endSessionsOfUser(trx, actor.userId, 'password-changed', sessionId)
    })
    events.closeSessions(ended)
  }

  return {
    lifecycle,
    describeSession,
    signIn,
    refresh,
    endOwnSession,
    signOutEverywhere,
    changePassword,
    listSessions: (actor: Actor): Promise<SessionRecord[]> => listLiveSessions(database, actor.userId),
  }
}
