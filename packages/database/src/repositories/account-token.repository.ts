import type { UserId } from '@fieldfare/contracts'
import type { Connection, Transaction } from '../connection.ts'

export type AccountTokenKind = 'invitation' | 'password-reset'

/** Makes a link of this kind the only one that works for the person: older ones stop. */
export async function replaceAccountToken(
  trx: Transaction,
  token: { userId: UserId; kind: AccountTokenKind; tokenHash: Buffer; expiresAt: Date },
): Promise<void> {
  await voidAccountTokens(trx, token.userId, token.kind)
  await trx('account_tokens').insert({
    user_id: token.userId,
    kind: token.kind,
    token_hash: token.tokenHash,
    expires_at: token.expiresAt,
  })
}

/** The person a link is for while it can still be used; does not use it up. */
export async function findAccountTokenUser(
  connection: Connection,
  kind: AccountTokenKind,
  tokenHash: Buffer,
): Promise<UserId | null> {
  const row: { userId: UserId } | undefined = await connection('account_tokens')
    .where({ kind, token_hash: tokenHash })
    .whereNull('used_at')
    .whereRaw('expires_at > now()')
    .first({ userId: 'user_id' })
  return row?.userId ?? null
}

/** Uses a link up, at most once however many try at the same moment. Null when it is used, expired or unknown. */
export async function consumeAccountToken(
  trx: Transaction,
  kind: AccountTokenKind,
  tokenHash: Buffer,
): Promise<UserId | null> {
  const rows: { userId: UserId }[] = await trx('account_tokens')
    .where({ kind, token_hash: tokenHash })
    .whereNull('used_at')
    .whereRaw('expires_at > now()')
    .update({ used_at: trx.fn.now() })
    .returning('user_id as userId')
  return rows[0]?.userId ?? null
}

/** Links of this kind that were not used yet stop working. */
export async function voidAccountTokens(
  trx: Transaction,
  userId: UserId,
  kind: AccountTokenKind,
): Promise<void> {
  await trx('account_tokens')
    .where({ user_id: userId, kind })
    .whereNull('used_at')
    .update({ used_at: trx.fn.now() })
}
