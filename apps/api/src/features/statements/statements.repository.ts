import type { Instant, Month, PartyId, StatementId } from '@fieldfare/contracts'
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
} from '@fieldfare/database'
import type { Knex } from 'knex'
import { daysOfMonth } from '../../records/months.ts'

export type StatementRow = {
  id: StatementId
  number: string
  month: Month
  partyId: PartyId
  partyName: string
  partyIpi: string | null
  currency: string
  currencyDigits: number
  ruleVersion: string
  distributionId: string
  grossMinor: bigint
  netMinor: bigint
  isIssued: boolean
  issuedAt: Instant | null
  hasPdf: boolean
}

export type StatementFilter = {
  month?: Month | undefined
  partyId?: PartyId | undefined
  search?: string | undefined
  sort: string
}

const sortColumns = {
  month: 'distributions.month',
  party: 'lower(statements.party_name)',
  netMinor: 'statements.net_minor',
  number: 'statements.number',
} as const

/** Statements of runs that stand. Publishers see theirs, once issued. */
function selectStatements(connection: Connection, scope: Scope): Knex.QueryBuilder {
  const query = connection('statements')
    .join('distributions', 'distributions.id', 'statements.distribution_id')
    .whereIn(
      'distributions.status',
      scope.kind === 'all' ? ['calculated', 'approved', 'issuing', 'issued'] : ['issued'],
    )
    .select(
      {
        id: 'statements.id',
        number: 'statements.number',
        partyId: 'statements.party_id',
        partyName: 'statements.party_name',
        partyIpi: 'statements.party_ipi',
        currency: 'distributions.currency',
        currencyDigits: 'distributions.currency_digits',
        ruleVersion: 'distributions.rules_version',
        distributionId: 'distributions.id',
        grossMinor: 'statements.gross_minor',
        netMinor: 'statements.net_minor',
        issuedAt: 'distributions.issued_at',
      },
      connection.raw(`to_char(distributions.month, 'YYYY-MM') as month`),
      connection.raw(`distributions.status = 'issued' as "isIssued"`),
      connection.raw(
        `exists (select from statement_files where statement_id = statements.id and kind = 'pdf') as "hasPdf"`,
      ),
    )
  return restrictToParties(query, scope, 'statements.party_id')
}

export async function listStatements(
  database: Database,
  scope: Scope,
  filter: StatementFilter & PageRequest,
): Promise<PageResult<StatementRow>> {
  const query = selectStatements(database, scope)
  if (filter.month !== undefined) query.where('distributions.month', daysOfMonth(filter.month).firstDay)
  if (filter.partyId !== undefined) query.where('statements.party_id', filter.partyId)
  const { search } = filter
  if (search !== undefined && search !== '') {
    const pattern = containsPattern(search)
    query.where((match) =>
      match
        .whereILike('statements.party_name', pattern)
        .orWhereILike('statements.number', pattern)
        .orWhereILike('statements.party_ipi', pattern),
    )
  }
  return fetchPage<StatementRow>(
    database,
    applySort(query, sortColumns, filter.sort, 'statements.id'),
    filter,
  )
}

async function firstRow<Row>(query: PromiseLike<Row[]>): Promise<Row | null> {
  const [row] = await query
  return row ?? null
}

export async function findStatement(
  connection: Connection,
  scope: Scope,
  id: StatementId,
): Promise<StatementRow | null> {
  return firstRow<StatementRow>(selectStatements(connection, scope).where('statements.id', id))
}

/** Where the finished file lies; the caller has found the statement in scope. */
export async function findStatementFile(
  connection: Connection,
  id: StatementId,
  kind: 'pdf' | 'csv',
): Promise<string | null> {
  const row: { storageKey: string } | undefined = await connection('statement_files')
    .where({ statement_id: id, kind })
    .first({ storageKey: 'storage_key' })
  return row?.storageKey ?? null
}
