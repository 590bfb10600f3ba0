import { activateUser, inTransaction, readSociety, recordAudit, recordSignIn } from '@fieldfare/database'
import { hashPassword } from '../../accounts/passwords.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { demandLink, useLink, type AccountLink } from './account-link.ts'
import type { OpenedSession, SessionLifecycle } from './session-lifecycle.ts'

const invitationLink = (token: string): AccountLink => ({ kind: 'invitation', token, status: 'invited' })

/** Becoming a user by a link from an e-mail. */
export function createInvitationService({ database }: Dependencies, lifecycle: SessionLifecycle) {
  async function readInvitation(token: string) {
    const user = await demandLink(database, invitationLink(token))
    const society = await readSociety(database)
    return { email: user.email, name: user.name, role: user.role, societyName: society.name }
  }

  async function acceptInvitation(
    acceptance: { token: string; name: string; password: string },
    userAgent: string,
  ): Promise<OpenedSession> {
    const link = invitationLink(acceptance.token)
    await demandLink(database, link)
    const passwordHash = await hashPassword(acceptance.password, 'password')
    return inTransaction(database, async (trx) => {
      const userId = await useLink(trx, link)
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

  return { readInvitation, acceptInvitation }
}
