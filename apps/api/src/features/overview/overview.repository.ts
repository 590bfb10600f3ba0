import type { Month, MonthStatus, StationId } from '@fieldfare/contracts'
import { restrictToStations, type Connection, type Scope } from '@fieldfare/database'
import { stationMonths } from '../../records/coverage.repository.ts'
import type { MonthDays } from '../../records/months.ts'
import { restrictPlays } from '../../records/play.repository.ts'
import {
  recordingReferenceSql,
  stationReferenceSql,
  type RecordingReference,
  type StationReference,
} from '../../records/references.ts'

const TOP_RECORDINGS = 10

export async function listStationReferences(
  connection: Connection,
  scope: Scope,
): Promise<StationReference[]> {
  const query = connection('stations').orderBy('stations.call_name')
  const rows = await restrictToStations(query, scope, 'stations.id').select<{ station: StationReference }[]>(
    connection.raw(`${stationReferenceSql} as station`),
  )
  return rows.map(({ station }) => station)
}

export type LogCount = { stationId: StationId; logs: number; inWork: number; refused: number }

/** Logs that reach into the month; where the length is not known yet, those that begin in it. */
export async function countLogs(connection: Connection, scope: Scope, days: MonthDays): Promise<LogCount[]> {
  const { rows } = await connection.raw<{ rows: LogCount[] }>(
    `with station_months as (?)
     select station_months.station_id as "stationId",
       (count(*) filter (where status <> 'rejected'))::int as logs,
       (count(*) filter (where status in ('queued', 'analysing')))::int as "inWork",
       (count(*) filter (where status in ('rejected', 'failed')))::int as refused
     from station_months join station_logs on station_logs.station_id = station_months.station_id
       and coalesce(station_logs.airtime && station_months.airtime,
         station_logs.started_at <@ station_months.airtime)
     group by station_months.station_id`,
    [stationMonths(connection, scope, days)],
  )
  return rows
}

/** Doubtful detections of the month that nobody has reviewed, by station. */
export async function countWaiting(
  connection: Connection,
  scope: Scope,
  days: MonthDays,
): Promise<{ stationId: StationId; waiting: number }[]> {
  const { rows } = await connection.raw<{ rows: { stationId: StationId; waiting: number }[] }>(
    `with station_months as (?)
     select detections.station_id as "stationId", count(*)::int as waiting
     from station_months join detections on detections.station_id = station_months.station_id
       and detections.started_at <@ station_months.airtime
     where detections.started_at >= ?::timestamptz - interval '1 day'
       and detections.started_at < ?::timestamptz + interval '1 day'
       and detections.decision = 'review'
       and not exists (select from detection_reviews where detection_id = detections.id)
     group by detections.station_id`,
    [stationMonths(connection, scope, days), `${days.firstDay}T00:00:00Z`, `${days.nextFirstDay}T00:00:00Z`],
  )
  return rows
}

export async function countOpenDisputes(
  connection: Connection,
  scope: Scope,
  days: MonthDays,
): Promise<number> {
  const query = connection('disputes')
    .join('plays', 'plays.id', 'disputes.play_id')
    .where('disputes.status', 'open')
    .where('plays.local_day', '>=', days.firstDay)
    .where('plays.local_day', '<', days.nextFirstDay)
  const row = await restrictToStations(query, scope, 'plays.station_id').first<{ disputes: number }>(
    connection.raw('count(*)::int as disputes'),
  )
  return row.disputes
}

export type TopRecording = { recording: RecordingReference; plays: number; seconds: number }

export async function listTopRecordings(
  connection: Connection,
  scope: Scope,
  days: MonthDays,
): Promise<TopRecording[]> {
  const query = connection('plays')
    .join('recordings', 'recordings.id', 'plays.recording_id')
    .where('plays.status', 'counted')
    .where('plays.local_day', '>=', days.firstDay)
    .where('plays.local_day', '<', days.nextFirstDay)
    .groupBy('recordings.id')
    .orderByRaw('plays desc, seconds desc, recordings.isrc')
    .limit(TOP_RECORDINGS)
  return restrictPlays(query, scope).select<TopRecording[]>(
    connection.raw(`${recordingReferenceSql} as recording`),
    connection.raw('count(*)::int as plays'),
    connection.raw('sum(extract(epoch from plays.ended_at - plays.started_at))::double precision as seconds'),
  )
}

/** Months with plays or logs in scope, or with a state of their own, newest first. */
export async function listHeldMonths(
  connection: Connection,
  scope: Scope,
): Promise<{ month: Month; status: MonthStatus }[]> {
  const plays = restrictPlays(
    connection('plays')
      .join('recordings', 'recordings.id', 'plays.recording_id')
      .whereRaw(`plays.local_day >= months.month and plays.local_day < months.month + interval '1 month'`),
    scope,
  ).select(connection.raw('1'))
  const logs = restrictToStations(
    connection('station_logs')
      .join('stations', 'stations.id', 'station_logs.station_id')
      .whereNot('station_logs.status', 'rejected')
      .whereRaw(
        `station_logs.started_at >= months.month::timestamp at time zone stations.time_zone and
         station_logs.started_at < (months.month + interval '1 month')::timestamp at time zone stations.time_zone`,
      ),
    scope,
    'station_logs.station_id',
  ).select(connection.raw('1'))
  const { rows } = await connection.raw<{ rows: { month: Month; status: MonthStatus }[] }>(
    `with bounds as (
       select least((select min(local_day) from plays), (select min(started_at)::date - 1 from station_logs)) as first_day,
         greatest((select max(local_day) from plays), (select max(started_at)::date + 1 from station_logs)) as last_day
     ),
     months as (
       select generate_series(date_trunc('month', first_day), last_day, interval '1 month')::date as month from bounds
     )
     select to_char(months.month, 'YYYY-MM') as month, coalesce(distribution_months.status, 'open') as status
     from months left join distribution_months using (month)
     where exists (?) or exists (?)
     order by months.month desc`,
    [plays, logs],
  )
  return rows
}
