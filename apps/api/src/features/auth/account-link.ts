import type { UserId } from '@fieldfare/contracts'
import {
  consumeAccountToken,
  findAccountTokenUser,
  findUser,
  lockUser,
  type AccountTokenKind,
  type Database,
  type Transaction,
  type UserRecord,
  type UserStatus,
} from '@fieldfare/database'
import { AppError } from '../../http/app-error.ts'
import { hashOpaqueToken } from '../../http/session-tokens.ts'

/** A link from an e-mail, and what its person must be for it to be good. */
export type AccountLink = { kind: AccountTokenKind; token: string; status: UserStatus }

function linkExpired(): AppError {
  return new AppError('link-expired', {
    detail: 'This link was used already, has run out or was replaced by a newer one. Ask for a new one.',
  })
}

/** Looks at a link before the slow hashing, so that a wrong one costs little; it is used up later. */
export async function demandLink(database: Database, link: AccountLink): Promise<UserRecord> {
  const userId = await findAccountTokenUser(database, link.kind, hashOpaqueToken(link.token))
  const user = userId === null ? null : await findUser(database, userId)
  if (user?.status !== link.status) throw linkExpired()
  return user
}

/** Uses a link up, once and for all. */
export async function useLink(trx: Transaction, link: AccountLink): Promise<UserId> {
  const userId = await consumeAccountToken(trx, link.kind, hashOpaqueToken(link.token))
  if (userId === null) throw linkExpired()
  await lockUser(trx, userId)
  const user = await findUser(trx, userId)
  if (user?.status !== link.status) throw linkExpired()
  return userId
}
