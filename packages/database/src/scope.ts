import type { PartyId, Role, StationId, UserId } from '@fieldfare/contracts'
import type { Knex } from 'knex'

/** The person behind a request, as far as services and repositories need to know. */
export type Actor = {
  userId: UserId
  name: string
  role: Role
  stationIds: readonly StationId[]
  partyIds: readonly PartyId[]
}

/** Which rows a person may see. Repositories demand it, so that no list is ever read without one. */
export type Scope =
  | { kind: 'all' }
  | { kind: 'stations'; stationIds: readonly StationId[] }
  | { kind: 'parties'; partyIds: readonly PartyId[] }

/** Uploaders see their stations, publishers their parties, the others the whole society. */
export function scopeOf(actor: Actor): Scope {
  switch (actor.role) {
    case 'uploader':
      return { kind: 'stations', stationIds: actor.stationIds }
    case 'publisher':
      return { kind: 'parties', partyIds: actor.partyIds }
    case 'clerk':
    case 'auditor':
    case 'admin':
      return { kind: 'all' }
  }
}

/** Keeps rows whose station is in scope; a scope of parties sees no station rows. */
export function restrictToStations<Builder extends Knex.QueryBuilder>(
  query: Builder,
  scope: Scope,
  stationColumn: string,
): Builder {
  if (scope.kind === 'stations') query.whereIn(stationColumn, [...scope.stationIds])
  if (scope.kind === 'parties') query.whereRaw('false')
  return query
}

/** Keeps rows whose party is in scope; a scope of stations sees no party rows. */
export function restrictToParties<Builder extends Knex.QueryBuilder>(
  query: Builder,
  scope: Scope,
  partyColumn: string,
): Builder {
  if (scope.kind === 'parties') query.whereIn(partyColumn, [...scope.partyIds])
  if (scope.kind === 'stations') query.whereRaw('false')
  return query
}

/** Whether one station is in scope, for writes that name it. */
export function isStationInScope(scope: Scope, stationId: StationId): boolean {
  return scope.kind === 'all' || (scope.kind === 'stations' && scope.stationIds.includes(stationId))
}
