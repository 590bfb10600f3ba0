import { setTimeout as delay } from 'node:timers/promises'
import type { UserId } from '@fieldfare/contracts'
import {
  activateUser,
  consumeAccountToken,
  endSessionsOfUser,
  findAccountTokenUser,
  findUser,
  findUserByEmail,
  inTransaction,
  lockUser,
  readSociety,
  recordAudit,
  recordSignIn,
  updatePasswordHash,
  type AccountTokenKind,
  type Transaction,
  type UserRecord,
  type UserStatus,
} from '@fieldfare/database'
import { sendPasswordReset } from '../../accounts/account-links.ts'
import { hashPassword } from '../../accounts/passwords.ts'
import { AppError } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { hashOpaqueToken } from '../../http/session-tokens.ts'
import type { OpenedSession, SessionLifecycle } from './session-lifecycle.ts'
import { createSignInThrottle } from './sign-in-throttle.ts'

/** Every reset request takes at least this long, whether the address is known or not. */
const RESET_REQUEST_MS = 300

export type AccountAccessService = ReturnType<typeof createAccountAccessService>

function linkExpired(): AppError {
  return new AppError('link-expired', {
    detail: 'This link was used already, has run out or was replaced by a newer one. Ask for a new one.',
  })
}

/** Getting into an account by a link from an e-mail: invitations and password resets. */
export function createAccountAccessService(dependencies: Dependencies, lifecycle: SessionLifecycle) {
  const { database, redis, configuration, clock, events } = dependencies
  const resetThrottle = createSignInThrottle(redis, 'password-reset')

  async function sendResetIfKnown(email: string): Promise<void> {
    const user = await findUserByEmail(database, email)
    if (user?.status !== 'active') return
    await inTransaction(database, async (trx) => {
      const society = await readSociety(trx)
      await sendPasswordReset(
        trx,
        { userId: user.id, email: user.email, name: user.name },
        { publicUrl: configuration.publicUrl, societyName: society.name, now: clock() },
      )
    })
  }

  async function requestPasswordReset(email: string, ip: string): Promise<void> {
    await resetThrottle.admit({ account: email, ip })
    await Promise.all([sendResetIfKnown(email), delay(RESET_REQUEST_MS)])
  }

  /** Looked at before the slow hashing, so that a wrong link costs us little; used up after it, in the transaction. */
  async function demandLink(kind: AccountTokenKind, token: string, status: UserStatus): Promise<UserRecord> {
    const userId = await findAccountTokenUser(database, kind, hashOpaqueToken(token))
    const user = userId === null ? null : await findUser(database, userId)
    if (user?.status !== status) throw linkExpired()
    return user
  }

  async function useLink(
    trx: Transaction,
    kind: AccountTokenKind,
    token: string,
    status: UserStatus,
  ): Promise<UserId> {
    const userId = await consumeAccountToken(trx, kind, hashOpaqueToken(token))
    if (userId === null) throw linkExpired()
    await lockUser(trx, userId)
    const user = await findUser(trx, userId)
    if (user?.status !== status) throw linkExpired()
    return userId
  }

  async function resetPassword(reset: { token: string; password: string }): Promise<void> {
    const user = await demandLink('password-reset', reset.token, 'active')
    const passwordHash = await hashPassword(reset.password, 'password')
    const ended = await inTransaction(database, async (trx) => {
      const userId = await useLink(trx, 'password-reset', reset.token, 'active')
      await updatePasswordHash(trx, userId, passwordHash)
      await recordAudit(trx, {
        actor: { userId, name: user.name },
        action: 'reset-password',
        subjectKind: 'user',
        subjectId: userId,
        summary: 'Set a new password with a link from an e-mail; all sessions ended.',
      })
      return endSessionsOfUser(trx, userId, 'password-reset')
    })
    events.closeSessions(ended)
  }

  async function readInvitation(token: string) {
    const user = await demandLink('invitation', token, 'invited')
    const society = await readSociety(database)
    return { email: user.email, name: user.name, role: user.role, societyName: society.name }
  }

  async function acceptInvitation(
    acceptance: { token: string; name: string; password: string },
    userAgent: string,
  ): Promise<OpenedSession> {
    await demandLink('invitation', acceptance.token, 'invited')
    const passwordHash = await hashPassword(acceptance.password, 'password')
    return inTransaction(database, async (trx) => {
      const userId = await useLink(trx, 'invitation', acceptance.token, 'invited')
      await activateUser(trx, userId, { name: acceptance.name, passwordHash })
      await recordSignIn(trx, userId)
      await recordAudit(trx, {
        actor: { userId, name: acceptance.name },
        action: 'accept-invitation',
        subjectKind: 'user',
        subjectId: userId,
        summary: 'Accepted the invitation.',
      })
      return lifecycle.open(trx, { userId, userAgent })
    })
  }

  return { requestPasswordReset, resetPassword, readInvitation, acceptInvitation }
}
