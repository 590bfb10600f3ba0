import { randomBytes } from 'node:crypto'
import type { PartyId, Role, StationId } from '@fieldfare/contracts'
import { insertUser, inTransaction, replaceUserScope, type Database } from '@fieldfare/database'
import { hash } from 'bcryptjs'

const BCRYPT_COST = 12

export type DemoPerson = { role: Role; email: string; name: string; password: string }

export type DemoPeople = {
  uploader: DemoPerson
  firstClerk: DemoPerson
  secondClerk: DemoPerson
  publisher: DemoPerson
  auditor: DemoPerson
  admin: DemoPerson
  /** Everyone, in the order in which the sign-ins are shown. */
  all: readonly DemoPerson[]
}

/** Passwords are made anew for every installation: a demo that is left running must not have a known one. */
function person(role: Role, name: string, email: string): DemoPerson {
  return { role, name, email, password: randomBytes(9).toString('base64url') }
}

export function planPeople(): DemoPeople {
  const people = {
    uploader: person('uploader', 'Nuno Saltram', 'uploader@demo.example'),
    firstClerk: person('clerk', 'Greta Holmwood', 'clerk@demo.example'),
    secondClerk: person('clerk', 'Ivo Pellan', 'second.clerk@demo.example'),
    publisher: person('publisher', 'Delphine Marrow', 'publisher@demo.example'),
    auditor: person('auditor', 'Osric Vane', 'auditor@demo.example'),
    admin: person('admin', 'Tamsin Arkwell', 'admin@demo.example'),
  }
  return { ...people, all: Object.values(people) }
}

async function insertPerson(
  database: Database,
  { role, name, email, password }: DemoPerson,
  scope: { stationIds: readonly StationId[]; partyIds: readonly PartyId[] },
): Promise<string> {
  const passwordHash = await hash(password, BCRYPT_COST)
  return inTransaction(database, async (trx) => {
    const id = await insertUser(trx, { email, name, role, status: 'active', passwordHash })
    await replaceUserScope(trx, id, scope)
    return id
  })
}

/** @returns the id of the first clerk, in whose name the catalogue was kept */
export async function insertPeople(
  database: Database,
  people: DemoPeople,
  scope: { stationIds: readonly StationId[]; partyIds: readonly PartyId[] },
): Promise<string> {
  const nothing = { stationIds: [], partyIds: [] }
  await insertPerson(database, people.uploader, { ...nothing, stationIds: scope.stationIds })
  const clerkId = await insertPerson(database, people.firstClerk, nothing)
  await insertPerson(database, people.secondClerk, nothing)
  await insertPerson(database, people.publisher, { ...nothing, partyIds: scope.partyIds })
  await insertPerson(database, people.auditor, nothing)
  await insertPerson(database, people.admin, nothing)
  return clerkId
}
