import { setTimeout as delay } from 'node:timers/promises'
import {
  endSessionsOfUser,
  findUserByEmail,
  inTransaction,
  readSociety,
  recordAudit,
  updatePasswordHash,
} from '@fieldfare/database'
import { sendPasswordReset } from '../../accounts/account-links.ts'
import { hashPassword } from '../../accounts/passwords.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { demandLink, useLink, type AccountLink } from './account-link.ts'
import { createSignInThrottle } from './sign-in-throttle.ts'

/** Every reset request takes at least this long, whether the address is known or not. */
const RESET_REQUEST_MS = 300

/** A new password by a link from an e-mail. */
export function createPasswordResetService(dependencies: Dependencies) {
  const { database, redis, configuration, clock, events } = dependencies
  const throttle = createSignInThrottle(redis, 'password-reset')

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
    await throttle.admit({ account: email, ip })
    await Promise.all([sendResetIfKnown(email), delay(RESET_REQUEST_MS)])
  }

  async function resetPassword(reset: { token: string; password: string }): Promise<void> {
    const link: AccountLink = { kind: 'password-reset', token: reset.token, status: 'active' }
    const user = await demandLink(database, link)
    const passwordHash = await hashPassword(reset.password, 'password')
    const ended = await inTransaction(database, async (trx) => {
      const userId = await useLink(trx, link)
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

  return { requestPasswordReset, resetPassword }
}
