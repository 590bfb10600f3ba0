import type { UserId } from '@fieldfare/contracts'
import {
  findUser,
  findUserByEmail,
  insertUser,
  inTransaction,
  lockUser,
  readSociety,
  recordAudit,
  replaceUserScope,
  updateUserAccount,
  type Actor,
  type Transaction,
  type UserRecord,
} from '@fieldfare/database'
import { roleLabels } from '@fieldfare/contracts'
import { sendInvitation } from '../../accounts/account-links.ts'
import { fieldRefused, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { scopeForRole, translateScopeError, type RequestedScope } from './user-scope.ts'

export type InvitationRequest = RequestedScope & { email: string; name: string }

async function keepInvited(trx: Transaction, request: InvitationRequest): Promise<UserId> {
  const { name, role } = request
  const held = await findUserByEmail(trx, request.email)
  if (held === null) return insertUser(trx, { email: request.email, name, role, status: 'invited' })
  await lockUser(trx, held.id)
  const current = await findUser(trx, held.id)
  if (current?.status !== 'invited') {
    throw fieldRefused(
      'email',
      'Somebody with this address is a user already. Change them in the list of users.',
    )
  }
  await updateUserAccount(trx, held.id, { name, role, status: 'invited' })
  return held.id
}

/** Invites a person, or sends the link again with what was changed. Mail, user and audit come together or not at all. */
export async function inviteUser(
  { database, configuration, clock }: Dependencies,
  actor: Actor,
  request: InvitationRequest,
): Promise<UserRecord> {
  const userId = await inTransaction(database, async (trx) => {
    const id = await keepInvited(trx, request)
    await replaceUserScope(trx, id, scopeForRole(request))
    const society = await readSociety(trx)
    await sendInvitation(
      trx,
      { userId: id, email: request.email, name: request.name },
      { publicUrl: configuration.publicUrl, societyName: society.name, now: clock() },
    )
    await recordAudit(trx, {
      actor,
      action: 'invite-user',
      subjectKind: 'user',
      subjectId: id,
      summary: `Invited ${request.name} as ${roleLabels[request.role]}.`,
    })
    return id
  }).catch((error: unknown) => {
    throw translateScopeError(error)
  })
  const user = await findUser(database, userId)
  if (user === null) throw notFound('This user')
  return user
}
