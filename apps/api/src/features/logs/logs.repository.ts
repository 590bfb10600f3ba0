import type { Instant, LogStatus, Month, MonthStatus, StationId, StationLogId } from '@fieldfare/contracts'
import {
  applySort,
  fetchPage,
  restrictToStations,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
  type Scope,
} from '@fieldfare/database'
import { daysOfMonth } from '../../records/months.ts'
import { stationReferenceSql, type StationReference } from '../../records/references.ts'

export type LogRecord = {
  id: StationLogId
  station: StationReference
  fileName: string
  sizeBytes: number
  format: string | null
  startedAt: Instant
  durationSeconds: number | null
  /** What counts as covered; null until the recording was read. */
  airtimeFrom: Instant | null
  airtimeTo: Instant | null
  status: LogStatus
  failureCode: string | null
  failureMessage: string | null
  warnings: string[]
  uploadedByName: string
  uploadedAt: Instant
  analysedAt: Instant | null
  musicSeconds: number | null
  speechSeconds: number | null
  silenceSeconds: number | null
  identifiedSeconds: number | null
  detections: number
  isAudioKept: boolean
  monthStatus: MonthStatus
}

export type LogFilter = PageRequest & {
  stationId?: StationId | undefined
  month?: Month | undefined
  status?: LogStatus | undefined
  sort: string
}

const sortColumns = {
  startedAt: 'station_logs.started_at',
  uploadedAt: 'station_logs.uploaded_at',
  durationSeconds: 'station_logs.duration_ms',
  station: 'stations.call_name',
}

const localMonth = "date_trunc('month', station_logs.started_at at time zone stations.time_zone)"

/** Counted plays within the airtime of the log; what overlaps counts once. */
const identifiedSeconds = `case when station_logs.airtime is not null and station_logs.music_ms is not null then (
  select coalesce(sum(extract(epoch from upper(span) - lower(span))), 0)::float8
  from unnest((
    select range_agg(tstzrange(plays.started_at, plays.ended_at) * station_logs.airtime)
    from plays
    where plays.station_id = station_logs.station_id and plays.status = 'counted'
      and plays.started_at > lower(station_logs.airtime) - interval '1 day'
      and plays.started_at < upper(station_logs.airtime)
      and tstzrange(plays.started_at, plays.ended_at) && station_logs.airtime
  )) as span) end as "identifiedSeconds"`

/** The bounds in time let PostgreSQL pass over the partitions of other months. */
const detections = `(select count(*)::int from detections
  where detections.log_id = station_logs.id and detections.started_at >= station_logs.started_at
    and detections.started_at <= station_logs.started_at + coalesce(station_logs.duration_ms, 0) * interval '1 millisecond'
  ) as detections`

const seconds = (column: string, name: string) => `station_logs.${column}::float8 / 1000 as "${name}"`

function selectLogs(connection: Connection, scope: Scope) {
  return restrictToStations(
    connection('station_logs')
      .join('stations', 'stations.id', 'station_logs.station_id')
      .join('users', 'users.id', 'station_logs.uploaded_by')
      .joinRaw(`left join distribution_months on distribution_months.month = ${localMonth}::date`)
      .select<LogRecord[]>(
        {
          id: 'station_logs.id',
          fileName: 'station_logs.file_name',
          format: 'station_logs.format',
          startedAt: 'station_logs.started_at',
          status: 'station_logs.status',
          failureCode: 'station_logs.failure_code',
          failureMessage: 'station_logs.failure_message',
          warnings: 'station_logs.warnings',
          uploadedByName: 'users.name',
          uploadedAt: 'station_logs.uploaded_at',
          analysedAt: 'station_logs.analysed_at',
        },
        connection.raw(`${stationReferenceSql} as station`),
        connection.raw('station_logs.size_bytes::float8 as "sizeBytes"'),
        connection.raw('lower(station_logs.airtime) as "airtimeFrom"'),
        connection.raw('upper(station_logs.airtime) as "airtimeTo"'),
        connection.raw(seconds('duration_ms', 'durationSeconds')),
        connection.raw(seconds('music_ms', 'musicSeconds')),
        connection.raw(seconds('speech_ms', 'speechSeconds')),
        connection.raw(seconds('silence_ms', 'silenceSeconds')),
        connection.raw(identifiedSeconds),
        connection.raw(detections),
        connection.raw('station_logs.storage_key is not null as "isAudioKept"'),
        connection.raw(`coalesce(distribution_months.status, 'open') as "monthStatus"`),
      ),
    scope,
    'station_logs.station_id',
  )
}

export async function listLogsInScope(
  database: Database,
  scope: Scope,
  filter: LogFilter,
): Promise<PageResult<LogRecord>> {
  const query = selectLogs(database, scope)
  const { stationId, month, status } = filter
  if (stationId !== undefined) query.where('station_logs.station_id', stationId)
  if (status !== undefined) query.where('station_logs.status', status)
  if (month !== undefined) {
    const { firstDay, nextFirstDay } = daysOfMonth(month)
    // The wide bounds serve the index; zones lie within a day of UTC.
    query
      .whereRaw(
        "station_logs.started_at between ?::timestamptz - interval '1 day' and ?::timestamptz + interval '1 day'",
        [firstDay, nextFirstDay],
      )
      .whereRaw(`${localMonth}::date = ?`, [firstDay])
  }
  return fetchPage<LogRecord>(database, applySort(query, sortColumns, filter.sort, 'station_logs.id'), filter)
}

export async function findLog(
  connection: Connection,
  scope: Scope,
  id: StationLogId,
): Promise<LogRecord | null> {
  const row: LogRecord | undefined = await selectLogs(connection, scope).where('station_logs.id', id).first()
  return row ?? null
}
