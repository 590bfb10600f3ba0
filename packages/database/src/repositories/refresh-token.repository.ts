import type { Instant, SessionId, UserId } from '@fieldfare/contracts'
import type { Database, Transaction } from '../connection.ts'

export type RefreshTokenRecord = {
  id: string
  sessionId: SessionId
  userId: UserId
  isExpired: boolean
  isSessionLive: boolean
  rotatedAt: Instant | null
  /** Milliseconds since it was exchanged, by the database's clock; null while it is the newest. */
  rotatedAgoMs: number | null
}

/** Finds a refresh token by the hash of what the browser sent and locks it, so that two exchanges take turns. */
export async function lockRefreshToken(
  trx: Transaction,
  tokenHash: Buffer,
): Promise<RefreshTokenRecord | null> {
  const row: RefreshTokenRecord | undefined = await trx('refresh_tokens')
    .join('sessions', 'sessions.id', 'refresh_tokens.session_id')
    .join('users', 'users.id', 'sessions.user_id')
    .where('refresh_tokens.token_hash', tokenHash)
    .forUpdate('refresh_tokens')
    .first(
      {
        id: 'refresh_tokens.id',
        sessionId: 'sessions.id',
        userId: 'users.id',
        rotatedAt: 'refresh_tokens.rotated_at',
      },
      trx.raw('refresh_tokens.expires_at <= now() as "isExpired"'),
      trx.raw(
        `(sessions.ended_at is null and sessions.expires_at > now() and users.status = 'active') as "isSessionLive"`,
      ),
      trx.raw(
        '(extract(epoch from clock_timestamp() - refresh_tokens.rotated_at) * 1000)::float8 as "rotatedAgoMs"',
      ),
    )
  return row ?? null
}

export async function insertRefreshToken(
  trx: Transaction,
  token: { sessionId: SessionId; tokenHash: Buffer; expiresAt: Date },
): Promise<string> {
  const rows: { id: string }[] = await trx('refresh_tokens')
    .insert({ session_id: token.sessionId, token_hash: token.tokenHash, expires_at: token.expiresAt })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new refresh token came back without an id')
  return row.id
}

/** Remembers that a token was exchanged; the first exchange counts, later ones within the grace do not move it. */
export async function markRefreshTokenRotated(
  trx: Transaction,
  id: string,
  replacedBy: string,
): Promise<void> {
  await trx('refresh_tokens')
    .where({ id })
    .whereNull('rotated_at')
    .update({ rotated_at: trx.raw('clock_timestamp()'), replaced_by: replacedBy })
}

/** Sessions that ended long ago go, and their refresh tokens with them. */
export async function removeOldSessions(database: Database, olderThanDays: number): Promise<number> {
  return database('sessions')
    .whereRaw("coalesce(ended_at, expires_at) < now() - ? * interval '1 day'", [olderThanDays])
    .delete()
}
