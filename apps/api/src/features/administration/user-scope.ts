import type { PartyId, Role, StationId } from '@fieldfare/contracts'
import { violates, type UserRecord, type UserScopeIds } from '@fieldfare/database'
import { fieldRefused } from '../../http/app-error.ts'

export type RequestedScope = { role: Role; stationIds: readonly StationId[]; partyIds: readonly PartyId[] }

/** Only uploaders have stations and only publishers have parties; the others see the whole society anyway. */
export function scopeForRole(requested: RequestedScope): UserScopeIds {
  return {
    stationIds: requested.role === 'uploader' ? requested.stationIds : [],
    partyIds: requested.role === 'publisher' ? requested.partyIds : [],
  }
}

function isSameSet(left: readonly string[], right: readonly string[]): boolean {
  const held = new Set(left)
  return held.size === new Set(right).size && right.every((id) => held.has(id))
}

export function hasSameScope(user: UserRecord, scope: UserScopeIds): boolean {
  return (
    isSameSet(
      user.stations.map((station) => station.id),
      scope.stationIds,
    ) &&
    isSameSet(
      user.parties.map((party) => party.id),
      scope.partyIds,
    )
  )
}

/** Says at the field what the database refused. */
export function translateScopeError(error: unknown): unknown {
  if (violates(error, 'user_stations_station_fkey'))
    return fieldRefused('stationIds', 'One of these stations is gone.')
  if (violates(error, 'user_parties_party_fkey'))
    return fieldRefused('partyIds', 'One of these parties is gone.')
  if (violates(error, 'users_email_key')) {
    return fieldRefused(
      'email',
      'Somebody with this address was added at the same moment. Load the page again.',
    )
  }
  return error
}
