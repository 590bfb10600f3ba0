import type { Connection } from '@fieldfare/database'
import { stationMonths } from '../../records/coverage.repository.ts'
import type { MonthDays } from '../../records/months.ts'

const WHOLE_PPM = 1_000_000

/** The moment the month is over for the society and for every station. */
export async function readMonthEnd(connection: Connection, days: MonthDays): Promise<string> {
  const { rows } = await connection.raw<{ rows: { end: string }[] }>(
    `select max(?::date::timestamp at time zone time_zone) as "end"
     from (select time_zone from society union select time_zone from stations) as zones`,
    [days.nextFirstDay],
  )
  const [row] = rows
  if (row === undefined) throw new Error('The end of the month came back empty')
  return row.end
}

export type LogReadiness = { inWork: number; failed: number }

/**
 * Logs of the month not analysed. Where the length is not known yet, a log that begins up to a day before the month
 * counts as well: it may reach into it.
 */
export async function countUnreadyLogs(connection: Connection, days: MonthDays): Promise<LogReadiness> {
  const { rows } = await connection.raw<{ rows: LogReadiness[] }>(
    `with station_months as (?)
     select (count(*) filter (where status in ('queued', 'analysing')))::int as "inWork",
       (count(*) filter (where status = 'failed'))::int as failed
     from station_months join station_logs on station_logs.station_id = station_months.station_id
     where status in ('queued', 'analysing', 'failed') and coalesce(
       station_logs.airtime && station_months.airtime,
       station_logs.started_at >= lower(station_months.airtime) - interval '1 day'
         and station_logs.started_at < upper(station_months.airtime))`,
    [stationMonths(connection, { kind: 'all' }, days)],
  )
  return rows[0] ?? { inWork: 0, failed: 0 }
}

export type Unsettled = { waiting: number; openDisputes: number; incompleteRecordings: number }

const validShareSql = `shares.valid_from <= played.local_day
  and (shares.valid_to is null or shares.valid_to >= played.local_day)`

/** What a careful person would settle before money is divided. */
export async function countUnsettled(connection: Connection, days: MonthDays): Promise<Unsettled> {
  const { rows } = await connection.raw<{ rows: Unsettled[] }>(
    `with station_months as (?),
     played as (
       select distinct plays.recording_id, recordings.work_id, plays.local_day
       from plays join recordings on recordings.id = plays.recording_id
       where plays.status = 'counted' and plays.local_day >= ?::date and plays.local_day < ?::date
     ),
     recording_claims as (
       select played.recording_id, played.local_day, sum(share_ppm) as ppm
       from played join shares on shares.recording_id = played.recording_id and ${validShareSql}
       group by played.recording_id, played.local_day
     ),
     work_claims as (
       select played.recording_id, played.local_day, sum(share_ppm) as ppm
       from played join shares on shares.work_id = played.work_id and ${validShareSql}
       group by played.recording_id, played.local_day
     )
     select
       (select count(*)::int from station_months join detections
          on detections.station_id = station_months.station_id
          and detections.started_at <@ station_months.airtime
        where detections.started_at >= ?::timestamptz - interval '1 day'
          and detections.started_at < ?::timestamptz + interval '1 day'
          and detections.decision = 'review'
          and not exists (select from detection_reviews where detection_id = detections.id)) as waiting,
       (select count(*)::int from disputes join plays on plays.id = disputes.play_id
        where disputes.status = 'open' and plays.local_day >= ?::date and plays.local_day < ?::date)
         as "openDisputes",
       (select count(distinct played.recording_id)::int from played
          left join recording_claims using (recording_id, local_day)
          left join work_claims using (recording_id, local_day)
        where recording_claims.ppm is distinct from ? or work_claims.ppm is distinct from ?)
         as "incompleteRecordings"`,
    [
      stationMonths(connection, { kind: 'all' }, days),
      days.firstDay,
      days.nextFirstDay,
      `${days.firstDay}T00:00:00Z`,
      `${days.nextFirstDay}T00:00:00Z`,
      days.firstDay,
      days.nextFirstDay,
      WHOLE_PPM,
      WHOLE_PPM,
    ],
  )
  return rows[0] ?? { waiting: 0, openDisputes: 0, incompleteRecordings: 0 }
}
