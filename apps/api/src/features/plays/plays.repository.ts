import type { LocalDate, Month, PartyId, PlayStatus, RecordingId, StationId } from '@fieldfare/contracts'
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
import {
  playSortColumns,
  restrictPlays,
  selectPlays,
  whereSharedBy,
  type PlayRow,
} from '../../records/play.repository.ts'
import { streamRows } from '../../records/stream-rows.repository.ts'

export type PlayFilter = {
  stationId?: StationId | undefined
  recordingId?: RecordingId | undefined
  partyId?: PartyId | undefined
  month?: Month | undefined
  day?: LocalDate | undefined
  status?: PlayStatus | undefined
  search?: string | undefined
  sort: string
}

function filterPlays(query: Knex.QueryBuilder, filter: PlayFilter): Knex.QueryBuilder {
  if (filter.stationId !== undefined) query.where('plays.station_id', filter.stationId)
  if (filter.recordingId !== undefined) query.where('plays.recording_id', filter.recordingId)
  if (filter.partyId !== undefined) whereSharedBy(query, [filter.partyId])
  if (filter.day !== undefined) query.where('plays.local_day', filter.day)
  if (filter.status !== undefined) query.where('plays.status', filter.status)
  if (filter.month !== undefined) {
    const { firstDay, nextFirstDay } = daysOfMonth(filter.month)
    query.where('plays.local_day', '>=', firstDay).where('plays.local_day', '<', nextFirstDay)
  }
  const { search } = filter
  if (search !== undefined && search !== '') {
    query.where((match) =>
      match
        .whereRaw(`(recordings.title || ' ' || recordings.artist) ilike ?`, [containsPattern(search)])
        .orWhereILike('recordings.isrc', containsPattern(search.replaceAll('-', ''))),
    )
  }
  return query
}

function sortedPlays(database: Database, scope: Scope, filter: PlayFilter): Knex.QueryBuilder {
  const query = filterPlays(selectPlays(database, scope), filter)
  return applySort(query, playSortColumns, filter.sort, 'plays.id')
}

export async function listPlays(
  database: Database,
  scope: Scope,
  filter: PlayFilter & PageRequest,
): Promise<PageResult<PlayRow>> {
  return fetchPage<PlayRow>(database, sortedPlays(database, scope, filter), filter)
}

export function streamPlays(database: Database, scope: Scope, filter: PlayFilter): AsyncGenerator<PlayRow> {
  return streamRows<PlayRow>(database, sortedPlays(database, scope, filter))
}

/** Publishers know the recordings in which one of their parties holds, held or will hold a share. */
export async function isRecordingInScope(
  connection: Connection,
  scope: Scope,
  recordingId: RecordingId,
): Promise<boolean> {
  const query = connection('recordings').where('recordings.id', recordingId)
  if (scope.kind !== 'all') {
    query.whereExists((exists) =>
      restrictToParties(
        exists
          .from('shares')
          .whereRaw('(shares.recording_id = recordings.id or shares.work_id = recordings.work_id)'),
        scope,
        'shares.party_id',
      ).select(connection.raw('1')),
    )
  }
  const row: { id: RecordingId } | undefined = await query.first('recordings.id')
  return row !== undefined
}

export type StationPlayCount = {
  station: { id: StationId; callName: string; name: string }
  plays: number
  seconds: number
}
export type MonthPlayCount = { month: string; plays: number; seconds: number }

const totals = `count(*)::int as plays,
  sum(extract(epoch from plays.ended_at - plays.started_at))::double precision as seconds`

function countedPlaysOf(connection: Connection, scope: Scope, recordingId: RecordingId) {
  const query = connection('plays')
    .join('stations', 'stations.id', 'plays.station_id')
    .join('recordings', 'recordings.id', 'plays.recording_id')
    .where({ 'plays.recording_id': recordingId, 'plays.status': 'counted' })
  return restrictPlays(query, scope)
}

export async function countPlaysByStation(
  connection: Connection,
  scope: Scope,
  recordingId: RecordingId,
): Promise<StationPlayCount[]> {
  return countedPlaysOf(connection, scope, recordingId)
    .groupBy('stations.id')
    .orderByRaw('plays desc, stations.call_name')
    .select<StationPlayCount[]>(
      connection.raw(
        `jsonb_build_object('id', stations.id, 'callName', stations.call_name, 'name', stations.name) as station`,
      ),
      connection.raw(totals),
    )
}

export async function countPlaysByMonth(
  connection: Connection,
  scope: Scope,
  recordingId: RecordingId,
): Promise<MonthPlayCount[]> {
  return countedPlaysOf(connection, scope, recordingId)
    .groupByRaw(`to_char(plays.local_day, 'YYYY-MM')`)
    .orderByRaw('1')
    .select<MonthPlayCount[]>(
      connection.raw(`to_char(plays.local_day, 'YYYY-MM') as month`),
      connection.raw(totals),
    )
}
