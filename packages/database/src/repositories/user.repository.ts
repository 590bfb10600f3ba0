import type { Instant, PartyId, Role, StationId, UserId } from '@fieldfare/contracts'
import type { Connection, Database, Transaction } from '../connection.ts'
import { containsPattern, fetchPage, type PageRequest, type PageResult } from '../paging.ts'

export type UserStatus = 'invited' | 'active' | 'disabled'
export type UserStation = { id: StationId; name: string; timeZone: string }
export type UserParty = { id: PartyId; name: string }

/** A person with their scope, without the password hash. */
export type UserRecord = {
  id: UserId
  email: string
  name: string
  role: Role
  status: UserStatus
  stations: UserStation[]
  parties: UserParty[]
  createdAt: Instant
  lastSignInAt: Instant | null
}

export type UserScopeIds = { stationIds: readonly StationId[]; partyIds: readonly PartyId[] }

const userColumns = {
  id: 'users.id',
  email: 'users.email',
  name: 'users.name',
  role: 'users.role',
  status: 'users.status',
  createdAt: 'users.created_at',
  lastSignInAt: 'users.last_sign_in_at',
}

const stationsOfUser = `coalesce((
  select jsonb_agg(jsonb_build_object('id', stations.id, 'name', stations.name, 'timeZone', stations.time_zone)
    order by stations.name, stations.id)
  from user_stations join stations on stations.id = user_stations.station_id
  where user_stations.user_id = users.id), '[]') as stations`

const partiesOfUser = `coalesce((
  select jsonb_agg(jsonb_build_object('id', parties.id, 'name', parties.name) order by parties.name, parties.id)
  from user_parties join parties on parties.id = user_parties.party_id
  where user_parties.user_id = users.id), '[]') as parties`

function selectUsers(connection: Connection) {
  return connection('users').select<UserRecord[]>(
    userColumns,
    connection.raw(stationsOfUser),
    connection.raw(partiesOfUser),
  )
}

export async function findUser(connection: Connection, id: UserId): Promise<UserRecord | null> {
  const row = await selectUsers(connection).where('users.id', id).first()
  return row ?? null
}

export async function findUserByEmail(connection: Connection, email: string): Promise<UserRecord | null> {
  const row = await selectUsers(connection).where('users.email', email).first()
  return row ?? null
}

/** The person and their hash, for checking a password; the hash is null until an invitation is accepted. */
export async function findCredentials(
  connection: Connection,
  email: string,
): Promise<{ id: UserId; status: UserStatus; passwordHash: string | null } | null> {
  const row: { id: UserId; status: UserStatus; passwordHash: string | null } | undefined = await connection(
    'users',
  )
    .where({ email })
    .first('id', 'status', { passwordHash: 'password_hash' })
  return row ?? null
}

/** The hash of a person signed in, for asking the present password again. */
export async function readPasswordHash(connection: Connection, id: UserId): Promise<string | null> {
  const row: { passwordHash: string | null } | undefined = await connection('users')
    .where({ id })
    .first({ passwordHash: 'password_hash' })
  return row?.passwordHash ?? null
}

export async function listUsers(
  database: Database,
  filter: PageRequest & { search?: string | undefined },
): Promise<PageResult<UserRecord>> {
  const query = selectUsers(database).orderBy([{ column: 'users.name' }, { column: 'users.id' }])
  const { search } = filter
  if (search !== undefined && search !== '') {
    const pattern = containsPattern(search)
    query.where((match) => match.whereILike('users.name', pattern).orWhereILike('users.email', pattern))
  }
  return fetchPage<UserRecord>(database, query, filter)
}

/** Whether somebody other than this person can still administer. Locks the administrators until the transaction ends. */
export async function hasOtherActiveAdmin(trx: Transaction, id: UserId): Promise<boolean> {
  const others: { id: UserId }[] = await trx('users')
    .where({ role: 'admin', status: 'active' })
    .whereNot({ id })
    .orderBy('id')
    .forUpdate()
    .select('id')
  return others.length > 0
}

/** Locks the row, so that changes to one person happen one after the other. */
export async function lockUser(trx: Transaction, id: UserId): Promise<void> {
  await trx('users').where({ id }).forUpdate().select('id')
}

export async function insertUser(
  trx: Transaction,
  user: { email: string; name: string; role: Role; status: UserStatus; passwordHash?: string },
): Promise<UserId> {
  const rows: { id: UserId }[] = await trx('users')
    .insert({
      email: user.email,
      name: user.name,
      role: user.role,
      status: user.status,
      password_hash: user.passwordHash ?? null,
    })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new user came back without an id')
  return row.id
}

export async function updateUserAccount(
  trx: Transaction,
  id: UserId,
  change: { name: string; role: Role; status: UserStatus },
): Promise<void> {
  await trx('users').where({ id }).update(change)
}

/** Makes the person active with a password of their own. */
export async function activateUser(
  trx: Transaction,
  id: UserId,
  account: { name: string; passwordHash: string },
): Promise<void> {
  await trx('users')
    .where({ id })
    .update({ name: account.name, password_hash: account.passwordHash, status: 'active' })
}

export async function updatePasswordHash(trx: Transaction, id: UserId, passwordHash: string): Promise<void> {
  await trx('users').where({ id }).update({ password_hash: passwordHash })
}

export async function recordSignIn(trx: Transaction, id: UserId): Promise<void> {
  await trx('users').where({ id }).update({ last_sign_in_at: trx.fn.now() })
}

/**
 * Replaces the stations and parties a person sees.
 *
 * @throws ConstraintViolation (foreign-key) for a station or party that does not exist
 */
export async function replaceUserScope(trx: Transaction, id: UserId, scope: UserScopeIds): Promise<void> {
  await trx('user_stations').where({ user_id: id }).delete()
  await trx('user_parties').where({ user_id: id }).delete()
  const stationIds = [...new Set(scope.stationIds)]
  const partyIds = [...new Set(scope.partyIds)]
  if (stationIds.length > 0) {
    await trx('user_stations').insert(stationIds.map((stationId) => ({ user_id: id, station_id: stationId })))
  }
  if (partyIds.length > 0) {
    await trx('user_parties').insert(partyIds.map((partyId) => ({ user_id: id, party_id: partyId })))
  }
}
