import type { SessionId } from '@fieldfare/contracts'
import {
  endSession,
  endSessionsOfUser,
  inTransaction,
  listLiveSessions,
  readPasswordHash,
  recordAudit,
  updatePasswordHash,
  voidAccountTokens,
  type Actor,
  type SessionRecord,
} from '@fieldfare/database'
import { hashPassword, isPasswordRight } from '../../accounts/passwords.ts'
import { fieldRefused, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { createSignInThrottle } from './sign-in-throttle.ts'

/** What a person does with their own sessions and password. */
export function createOwnSessionsService(dependencies: Dependencies) {
  const { database, redis, events } = dependencies
  const passwordThrottle = createSignInThrottle(redis, 'change-password')

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
      // A link asked for before, perhaps by somebody else, must not undo this.
      await voidAccountTokens(trx, actor.userId, 'password-reset')
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
    endOwnSession,
    signOutEverywhere,
    changePassword,
    listSessions: (actor: Actor): Promise<SessionRecord[]> => listLiveSessions(database, actor.userId),
  }
}
