import type { PartyId, WorkId } from '@fieldfare/contracts'
import {
  applySort,
  containsPattern,
  fetchPage,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
  type Scope,
  type Transaction,
} from '@fieldfare/database'
import { recordingReferenceSql, type RecordingReference } from '../../records/references.ts'
import { sharesSql, type ShareRecord } from '../../shares/shares.repository.ts'
import { recordingsInScope, workHeldBy, worksInScope } from './catalogue-scope.ts'
import { codePattern } from './code-search.ts'

export type WorkDetails = { title: string; creators: string; iswc: string | null }
export type WorkRecord = WorkDetails & { id: WorkId; recordings: RecordingReference[]; shares: ShareRecord[] }
export type WorkFilter = PageRequest & {
  search?: string | undefined
  partyId?: PartyId | undefined
  sort: string
}

const sortColumns = { title: 'works.title', iswc: 'works.iswc' }

/** The recordings of a work that are in scope themselves: a link to one that is not would lead nowhere. */
function recordingsOfWork(connection: Connection, scope: Scope) {
  const condition = recordingsInScope(scope)
  const inScope = condition === null ? '' : `and ${condition.sql}`
  return connection.raw(
    `coalesce((
      select jsonb_agg(${recordingReferenceSql} order by recordings.title, recordings.isrc)
      from recordings where recordings.work_id = works.id ${inScope}), '[]') as recordings`,
    condition?.bindings ?? [],
  )
}

function selectWorks(connection: Connection, scope: Scope) {
  const query = connection('works').select<WorkRecord[]>(
    { id: 'works.id', title: 'works.title', creators: 'works.creators', iswc: 'works.iswc' },
    recordingsOfWork(connection, scope),
    connection.raw(sharesSql('work_id', 'works.id')),
  )
  const condition = worksInScope(scope)
  if (condition !== null) query.whereRaw(condition.sql, condition.bindings)
  return query
}

export async function listWorksInScope(
  database: Database,
  scope: Scope,
  filter: WorkFilter,
): Promise<PageResult<WorkRecord>> {
  const query = selectWorks(database, scope)
  const { search, partyId } = filter
  if (partyId !== undefined) {
    const held = workHeldBy([partyId])
    if (held !== null) query.whereRaw(held.sql, held.bindings)
  }
  if (search !== undefined && search !== '') {
    query.where((match) => {
      match.whereRaw("(works.title || ' ' || works.creators) ilike ?", [containsPattern(search)])
      const code = codePattern(search)
      if (code !== null) match.orWhere('works.iswc', 'like', code)
    })
  }
  return fetchPage<WorkRecord>(database, applySort(query, sortColumns, filter.sort, 'works.id'), filter)
}

export async function findWork(connection: Connection, scope: Scope, id: WorkId): Promise<WorkRecord | null> {
  const row: WorkRecord | undefined = await selectWorks(connection, scope).where('works.id', id).first()
  return row ?? null
}

export async function findWorkByIswc(
  connection: Connection,
  iswc: string,
): Promise<{ id: WorkId; title: string } | null> {
  const row: { id: WorkId; title: string } | undefined = await connection('works')
    .where({ iswc })
    .first('id', 'title')
  return row ?? null
}

export async function lockWork(trx: Transaction, id: WorkId): Promise<WorkDetails | null> {
  const row: WorkDetails | undefined = await trx('works')
    .where({ id })
    .forUpdate()
    .first('title', 'creators', 'iswc')
  return row ?? null
}

/** @throws ConstraintViolation works_iswc_key */
export async function insertWork(trx: Transaction, details: WorkDetails): Promise<WorkId> {
  const rows: { id: WorkId }[] = await trx('works')
    .insert({ title: details.title, creators: details.creators, iswc: details.iswc })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new work came back without an id')
  return row.id
}

/** @throws ConstraintViolation works_iswc_key */
export async function updateWorkDetails(trx: Transaction, id: WorkId, details: WorkDetails): Promise<void> {
  await trx('works')
    .where({ id })
    .update({ title: details.title, creators: details.creators, iswc: details.iswc })
}
