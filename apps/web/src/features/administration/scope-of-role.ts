import type { PartyId, Role, StationId } from '@fieldfare/contracts'

type Scope = { role: Role; stationIds: StationId[]; partyIds: PartyId[] }

/** Drops what was chosen for another role before the role was changed. */
export function scopeOfRole<Person extends Scope>(person: Person): Person {
  return {
    ...person,
    stationIds: person.role === 'uploader' ? person.stationIds : [],
    partyIds: person.role === 'publisher' ? person.partyIds : [],
  }
}
