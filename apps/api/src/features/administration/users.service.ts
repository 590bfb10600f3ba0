import { roleLabels, type UserId } from '@fieldfare/contracts'
import {
  endSessionsOfUser,
  findUser,
  hasOtherActiveAdmin,
  inTransaction,
  lockUser,
  readPasswordHash,
  recordAudit,
  replaceUserScope,
  updateUserAccount,
  voidAccountTokens,
  type Actor,
  type Transaction,
  type UserRecord,
  type UserStatus,
} from '@fieldfare/database'
import { notAllowed, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { hasSameScope, scopeForRole, translateScopeError, type RequestedScope } from './user-scope.ts'

export type UserChange = RequestedScope & { name: string; status: 'active' | 'disabled' }

export async function getUser({ database }: Dependencies, id: UserId): Promise<UserRecord> {
  const user = await findUser(database, id)
  if (user === null) throw notFound('This user')
  return user
}

/** There is always somebody who can administer, and nobody shuts themselves out. */
async function guardAdministrators(
  trx: Transaction,
  actor: Actor,
  user: UserRecord,
  change: UserChange,
): Promise<void> {
  const staysAdmin = change.role === 'admin' && change.status === 'active'
  if (user.role !== 'admin' || staysAdmin) return
  if (user.id === actor.userId) {
    throw notAllowed(
      'You cannot disable yourself or give up your own administration; another administrator can.',
    )
  }
  if (user.status === 'active' && !(await hasOtherActiveAdmin(trx, user.id))) {
    throw notAllowed('This is the last administrator. Make somebody else one first.')
  }
}

/** Whoever never chose a password waits for their invitation; nobody can make them active from outside. */
async function nextStatus(
  trx: Transaction,
  user: UserRecord,
  wanted: UserChange['status'],
): Promise<UserStatus> {
  if (wanted === 'disabled') return 'disabled'
  return (await readPasswordHash(trx, user.id)) === null ? 'invited' : 'active'
}

function describeChange(
  user: UserRecord,
  change: UserChange,
  status: UserStatus,
  hasNewScope: boolean,
): string {
  const parts = [
    change.name === user.name ? null : `name now ${change.name}`,
    change.role === user.role ? null : `role now ${roleLabels[change.role]}`,
    status === user.status ? null : `now ${status}`,
    hasNewScope ? 'other stations or parties' : null,
  ].filter((part) => part !== null)
  return parts.length === 0
    ? `Saved ${user.name} without a change.`
    : `Changed ${user.name}: ${parts.join(', ')}.`
}

/** Changes take effect at once: where rights change, the person's sessions end. */
export async function updateUser(
  dependencies: Dependencies,
  actor: Actor,
  id: UserId,
  change: UserChange,
): Promise<UserRecord> {
  const ended = await inTransaction(dependencies.database, async (trx) => {
    await lockUser(trx, id)
    const user = await findUser(trx, id)
    if (user === null) throw notFound('This user')
    await guardAdministrators(trx, actor, user, change)
    const scope = scopeForRole(change)
    const status = await nextStatus(trx, user, change.status)
    const hasNewScope = !hasSameScope(user, scope)
    await updateUserAccount(trx, id, { name: change.name, role: change.role, status })
    if (hasNewScope) await replaceUserScope(trx, id, scope)
    if (status === 'disabled') {
      await voidAccountTokens(trx, id, 'invitation')
      await voidAccountTokens(trx, id, 'password-reset')
    }
    await recordAudit(trx, {
      actor,
      action: 'update-user',
      subjectKind: 'user',
      subjectId: id,
      summary: describeChange(user, change, status, hasNewScope),
    })
    const hasNewRights = hasNewScope || change.role !== user.role || status !== user.status
    return hasNewRights ? endSessionsOfUser(trx, id, 'access-changed') : []
  }).catch((error: unknown) => {
    throw translateScopeError(error)
  })
  dependencies.events.closeSessions(ended)
  return getUser(dependencies, id)
}
