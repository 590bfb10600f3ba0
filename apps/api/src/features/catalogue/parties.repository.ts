import type { PartyId } from '@fieldfare/contracts'
import {
  applySort,
  containsPattern,
  fetchPage,
  restrictToParties,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
  type Scope,
  type Transaction,
} from '@fieldfare/database'
import { codePattern } from './code-search.ts'

export type PartyDetails = { name: string; ipi: string | null; ipiCheckOk: boolean | null }
export type PartyRecord = PartyDetails & { id: PartyId; works: number; recordings: number }
export type PartyFilter = PageRequest & { search?: string | undefined; sort: string }

const sortColumns = { name: 'parties.name', ipi: 'parties.ipi' }

function selectParties(connection: Connection, scope: Scope) {
  return restrictToParties(
    connection('parties').select<PartyRecord[]>(
      { id: 'parties.id', name: 'parties.name', ipi: 'parties.ipi', ipiCheckOk: 'parties.ipi_check_ok' },
      connection.raw(
        '(select count(distinct work_id)::int from shares where party_id = parties.id) as works',
      ),
      connection.raw(
        '(select count(distinct recording_id)::int from shares where party_id = parties.id) as recordings',
      ),
    ),
    scope,
    'parties.id',
  )
}

export async function listPartiesInScope(
  database: Database,
  scope: Scope,
  filter: PartyFilter,
): Promise<PageResult<PartyRecord>> {
  const query = selectParties(database, scope)
  const { search } = filter
  if (search !== undefined && search !== '') {
    query.where((match) => {
      match.whereILike('parties.name', containsPattern(search))
      const code = codePattern(search)
      if (code !== null) match.orWhere('parties.ipi', 'like', code)
    })
  }
  return fetchPage<PartyRecord>(database, applySort(query, sortColumns, filter.sort, 'parties.id'), filter)
}

export async function findParty(
  connection: Connection,
  scope: Scope,
  id: PartyId,
): Promise<PartyRecord | null> {
  const row: PartyRecord | undefined = await selectParties(connection, scope).where('parties.id', id).first()
  return row ?? null
}

export async function findPartyByIpi(
  connection: Connection,
  ipi: string,
): Promise<{ id: PartyId; name: string } | null> {
  const row: { id: PartyId; name: string } | undefined = await connection('parties')
    .where({ ipi })
    .first('id', 'name')
  return row ?? null
}

export async function lockParty(trx: Transaction, id: PartyId): Promise<PartyDetails | null> {
  const row: PartyDetails | undefined = await trx('parties')
    .where({ id })
    .forUpdate()
    .first({ name: 'name', ipi: 'ipi', ipiCheckOk: 'ipi_check_ok' })
  return row ?? null
}

function detailColumns(details: PartyDetails) {
  return { name: details.name, ipi: details.ipi, ipi_check_ok: details.ipiCheckOk }
}

/** @throws ConstraintViolation parties_ipi_key */
export async function insertParty(trx: Transaction, details: PartyDetails): Promise<PartyId> {
  const rows: { id: PartyId }[] = await trx('parties').insert(detailColumns(details)).returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new party came back without an id')
  return row.id
}

/** @throws ConstraintViolation parties_ipi_key */
export async function updatePartyDetails(
  trx: Transaction,
  id: PartyId,
  details: PartyDetails,
): Promise<void> {
  await trx('parties').where({ id }).update(detailColumns(details))
}
