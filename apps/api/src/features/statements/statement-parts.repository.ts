import type { Right, StatementId } from '@fieldfare/contracts'
import {
  applySort,
  containsPattern,
  fetchPage,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
} from '@fieldfare/database'
import type { Knex } from 'knex'
import { selectPlays, type PlayRow } from '../../records/play.repository.ts'
import { stationReferenceSql, type StationReference } from '../../records/references.ts'

/** All of these are of a statement the caller has found in scope. */
export type StatementParts = {
  deductions: { code: string; label: string; ratePpm: number; amountMinor: bigint }[]
  rights: { right: Right; netMinor: bigint }[]
  stations: { station: StationReference; netMinor: bigint; heldMs: bigint; expectedMs: bigint }[]
  holdbacks: {
    station: StationReference
    right: Right
    subject: string
    reasonCode: string
    reason: string
    amountMinor: bigint
  }[]
  lines: number
}

export async function readStatementParts(connection: Connection, id: StatementId): Promise<StatementParts> {
  const deductions: StatementParts['deductions'] = await connection('statement_deductions')
    .where({ statement_id: id })
    .orderBy('position')
    .select('code', 'label', { ratePpm: 'rate_ppm', amountMinor: 'amount_minor' })
  const rights = await connection('statement_lines')
    .where({ statement_id: id })
    .groupBy('right')
    .select<StatementParts['rights']>('right', connection.raw('sum(amount_minor)::bigint as "netMinor"'))
  const stations = await connection('statement_stations')
    .join('stations', 'stations.id', 'statement_stations.station_id')
    .where({ statement_id: id })
    .orderBy('stations.call_name')
    .select<StatementParts['stations']>(
      { netMinor: 'net_minor', heldMs: 'held_ms', expectedMs: 'expected_ms' },
      connection.raw(`${stationReferenceSql} as station`),
    )
  const holdbacks = await connection('statement_holdbacks')
    .join('distribution_holdbacks', 'distribution_holdbacks.id', 'statement_holdbacks.holdback_id')
    .join('stations', 'stations.id', 'distribution_holdbacks.station_id')
    .where({ statement_id: id })
    .orderByRaw('amount_minor desc, stations.call_name, subject, distribution_holdbacks.id')
    .select<StatementParts['holdbacks']>(
      'right',
      'subject',
      'reason',
      { reasonCode: 'reason_code', amountMinor: 'amount_minor' },
      connection.raw(`${stationReferenceSql} as station`),
    )
  const counted = await connection('statement_lines')
    .where({ statement_id: id })
    .first<{ lines: number }>(connection.raw('count(*)::int as lines'))
  return { deductions, rights, stations, holdbacks, lines: counted.lines }
}

export type StatementLineRow = {
  lineNumber: number
  right: Right
  station: StationReference
  title: string
  artist: string
  code: string | null
  plays: number
  creditedMs: bigint
  sharePpm: number
  amountMinor: bigint
}

export type StatementLineFilter = { right?: Right | undefined; search?: string | undefined; sort: string }

const sortColumns = {
  lineNumber: 'statement_lines.line_number',
  title: 'lower(statement_lines.title)',
  plays: 'statement_lines.plays',
  creditedSeconds: 'statement_lines.credited_ms',
  amountMinor: 'statement_lines.amount_minor',
} as const

function selectLines(connection: Connection, id: StatementId): Knex.QueryBuilder {
  return connection('statement_lines')
    .join('stations', 'stations.id', 'statement_lines.station_id')
    .where('statement_lines.statement_id', id)
    .select(
      {
        lineNumber: 'statement_lines.line_number',
        right: 'statement_lines.right',
        title: 'statement_lines.title',
        artist: 'statement_lines.artist',
        code: 'statement_lines.code',
        plays: 'statement_lines.plays',
        creditedMs: 'statement_lines.credited_ms',
        sharePpm: 'statement_lines.share_ppm',
        amountMinor: 'statement_lines.amount_minor',
      },
      connection.raw(`${stationReferenceSql} as station`),
    )
}

export async function listStatementLines(
  database: Database,
  id: StatementId,
  filter: StatementLineFilter & PageRequest,
): Promise<PageResult<StatementLineRow>> {
  const query = selectLines(database, id)
  if (filter.right !== undefined) query.where('statement_lines.right', filter.right)
  const { search } = filter
  if (search !== undefined && search !== '') {
    query.where((match) =>
      match
        .whereRaw(`(statement_lines.title || ' ' || statement_lines.artist) ilike ?`, [
          containsPattern(search),
        ])
        .orWhereILike('statement_lines.code', containsPattern(search.replaceAll(/[-.]/g, '')))
        .orWhereILike('stations.call_name', containsPattern(search)),
    )
  }
  const sorted = applySort(query, sortColumns, filter.sort, 'statement_lines.line_number')
  return fetchPage<StatementLineRow>(database, sorted, filter)
}

export async function hasStatementLine(
  connection: Connection,
  id: StatementId,
  lineNumber: number,
): Promise<boolean> {
  const row: { plays: number } | undefined = await connection('statement_lines')
    .where({ statement_id: id, line_number: lineNumber })
    .first('plays')
  return row !== undefined
}

/**
 * The plays behind one line, in the order of time. A statement stays checkable to its sound whatever becomes of the
 * shares later, so the line itself is the scope here.
 */
export async function listPlaysOfLine(
  database: Database,
  id: StatementId,
  lineNumber: number,
  page: PageRequest,
): Promise<PageResult<PlayRow>> {
  const query = selectPlays(database, { kind: 'all' })
    .join('statement_line_plays', 'statement_line_plays.play_id', 'plays.id')
    .where({
      'statement_line_plays.statement_id': id,
      'statement_line_plays.line_number': lineNumber,
    })
    .orderBy(['plays.started_at', 'plays.id'])
  return fetchPage<PlayRow>(database, query, page)
}
