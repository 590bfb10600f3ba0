import type { Instant, PartyId, Role, SessionId, StationId, UserId } from '@fieldfare/contracts'
import type { Connection, Database, Transaction } from '../connection.ts'
import type { Actor } from '../scope.ts'

export type SessionEndReason =
  | 'signed-out'
  | 'ended-by-user'
  | 'signed-out-everywhere'
  | 'password-changed'
  | 'password-reset'
  | 'access-changed'
  | 'refresh-reused'

export type SessionRecord = { id: SessionId; userAgent: string; createdAt: Instant; lastUsedAt: Instant }

type ActorRow = {
  userId: UserId
  name: string
  role: Role
  stationIds: StationId[]
  partyIds: PartyId[]
}

export async function insertSession(
  trx: Transaction,
  session: { userId: UserId; userAgent: string; expiresAt: Date },
): Promise<SessionId> {
  const rows: { id: SessionId }[] = await trx('sessions')
    .insert({
      user_id: session.userId,
      user_agent: session.userAgent.slice(0, 300),
      expires_at: session.expiresAt,
    })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new session came back without an id')
  return row.id
}

/** Who a live session belongs to, with the scope of this moment; null once it has ended or its user is not active. */
export async function findSessionActor(connection: Connection, id: SessionId): Promise<Actor | null> {
  const row: ActorRow | undefined = await connection('sessions')
    .join('users', 'users.id', 'sessions.user_id')
    .where('sessions.id', id)
    .whereNull('sessions.ended_at')
    .whereRaw('sessions.expires_at > now()')
    .where('users.status', 'active')
    .first(
      { userId: 'users.id', name: 'users.name', role: 'users.role' },
      connection.raw(
        'array(select station_id::text from user_stations where user_id = users.id order by station_id) as "stationIds"',
      ),
      connection.raw(
        'array(select party_id::text from user_parties where user_id = users.id order by party_id) as "partyIds"',
      ),
    )
  return row ?? null
}

/** Whether the session still runs: what open event streams ask. */
export async function isSessionLive(connection: Connection, id: SessionId): Promise<boolean> {
  return (await findSessionActor(connection, id)) !== null
}

/** Remembers when a session was last used, to the minute, so that reading does not mean writing each time. */
export async function touchSession(database: Database, id: SessionId): Promise<void> {
  await database('sessions')
    .where({ id })
    .whereRaw("last_used_at < now() - interval '1 minute'")
    .update({ last_used_at: database.fn.now() })
}

export async function listLiveSessions(database: Database, userId: UserId): Promise<SessionRecord[]> {
  return database('sessions')
    .where({ user_id: userId })
    .whereNull('ended_at')
    .whereRaw('expires_at > now()')
    .orderBy('last_used_at', 'desc')
    .orderBy('id')
    .select<SessionRecord[]>({
      id: 'id',
      userAgent: 'user_agent',
      createdAt: 'created_at',
      lastUsedAt: 'last_used_at',
    })
}

/** Ends one session of this person. False when there is no such live session. */
export async function endSession(
  trx: Transaction,
  session: { id: SessionId; userId: UserId },
  reason: SessionEndReason,
): Promise<boolean> {
  const ended = await trx('sessions')
    .where({ id: session.id, user_id: session.userId })
    .whereNull('ended_at')
    .update({ ended_at: trx.fn.now(), end_reason: reason })
  return ended === 1
}

/** Ends all sessions of a person, but for one if named. Returns the ids of those ended. */
export async function endSessionsOfUser(
  trx: Transaction,
  userId: UserId,
  reason: SessionEndReason,
  keep?: SessionId,
): Promise<SessionId[]> {
  const query = trx('sessions').where({ user_id: userId }).whereNull('ended_at')
  if (keep !== undefined) query.whereNot({ id: keep })
  const rows: { id: SessionId }[] = await query
    .update({ ended_at: trx.fn.now(), end_reason: reason })
    .returning('id')
  return rows.map((row) => row.id)
}
