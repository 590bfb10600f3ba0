import { formatIpi, readIpi, type PartyId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  violates,
  type Actor,
  type Database,
  type Scope,
} from '@fieldfare/database'
import { notFound } from '../../http/app-error.ts'
import { describeChanges } from './field-changes.ts'
import {
  findParty,
  findPartyByIpi,
  insertParty,
  listPartiesInScope,
  lockParty,
  updatePartyDetails,
  type PartyDetails,
  type PartyFilter,
  type PartyRecord,
} from './parties.repository.ts'
import { takenCode } from './taken-code.ts'

export type PartyInput = { name: string; ipi: string | null }

function detailsOf({ name, ipi }: PartyInput): PartyDetails {
  if (ipi === null) return { name, ipi, ipiCheckOk: null }
  const reading = readIpi(ipi)
  return { name, ipi, ipiCheckOk: reading.ok && reading.checkOk }
}

export function createPartiesService({ database }: { database: Database }) {
  async function demand(scope: Scope, id: PartyId): Promise<PartyRecord> {
    const party = await findParty(database, scope, id)
    if (party === null) throw notFound('This party')
    return party
  }

  /** Looks up who has the IPI only after the transaction has failed on it. */
  async function refuseTakenIpi(error: unknown, ipi: string | null): Promise<never> {
    if (ipi === null || !violates(error, 'parties_ipi_key')) throw error
    const holder = await findPartyByIpi(database, ipi)
    throw takenCode('ipi', formatIpi(ipi), holder?.name ?? null)
  }

  async function create(actor: Actor, input: PartyInput): Promise<PartyRecord> {
    const id = await inTransaction(database, async (trx) => {
      const partyId = await insertParty(trx, detailsOf(input))
      const ipi = input.ipi === null ? 'no IPI' : `IPI ${input.ipi}`
      await recordAudit(trx, {
        actor,
        action: 'create-party',
        subjectKind: 'party',
        subjectId: partyId,
        summary: `Added the party “${input.name}”, ${ipi}.`,
      })
      return partyId
    }).catch((error: unknown) => refuseTakenIpi(error, input.ipi))
    return demand({ kind: 'all' }, id)
  }

  async function update(actor: Actor, id: PartyId, input: PartyInput): Promise<PartyRecord> {
    await inTransaction(database, async (trx) => {
      const before = await lockParty(trx, id)
      if (before === null) throw notFound('This party')
      const changes = describeChanges([
        { label: 'name', before: before.name, after: input.name },
        { label: 'IPI', before: before.ipi, after: input.ipi },
      ])
      if (changes === '') return
      await updatePartyDetails(trx, id, detailsOf(input))
      await recordAudit(trx, {
        actor,
        action: 'update-party',
        subjectKind: 'party',
        subjectId: id,
        summary: `Changed a party: ${changes}.`,
      })
    }).catch((error: unknown) => refuseTakenIpi(error, input.ipi))
    return demand({ kind: 'all' }, id)
  }

  return {
    list: (scope: Scope, filter: PartyFilter) => listPartiesInScope(database, scope, filter),
    get: demand,
    create,
    update,
  }
}
