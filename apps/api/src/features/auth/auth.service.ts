import type { UserId } from '@fieldfare/contracts'
import {
  findCredentials,
  findUser,
  inTransaction,
  readSociety,
  recordSignIn,
  type Society,
  type UserRecord,
} from '@fieldfare/database'
import { isPasswordRight } from '../../accounts/passwords.ts'
import { AppError } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { createSessionTokens } from '../../http/session-tokens.ts'
import { createSessionLifecycle, type OpenedSession } from './session-lifecycle.ts'
import { createSignInThrottle } from './sign-in-throttle.ts'

export type Visitor = { ip: string; userAgent: string }
export type SessionDetails = { user: UserRecord; society: Society; hasLocalInbox: boolean }

function sessionOver(detail: string): AppError {
  return new AppError('not-signed-in', { detail })
}

/** Signing in, keeping a session alive, and saying who is signed in. */
export function createAuthService(dependencies: Dependencies) {
  const { database, redis, configuration, clock } = dependencies
  const lifecycle = createSessionLifecycle({
    database,
    tokens: createSessionTokens(configuration.tokenSecret),
    clock,
  })
  const signInThrottle = createSignInThrottle(redis, 'sign-in')

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

  return { lifecycle, describeSession, signIn, refresh }
}
