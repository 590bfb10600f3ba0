import type { StationId } from '@fieldfare/contracts'
import type { Connection, Scope } from '@fieldfare/database'
import { heldAirtimeSql, stationMonths } from '../../records/coverage.repository.ts'
import type { MonthDays } from '../../records/months.ts'

export type AirtimeKind = 'held' | 'music' | 'identified'

/** Seconds of one kind for a station, for a local day or for a local hour: two of the three keys are null. */
export type AirtimeSum = {
  stationId: StationId | null
  day: string | null
  hour: number | null
  kind: AirtimeKind
  seconds: number
}

/**
 * Airtime by station, by local day and by local hour. What overlaps counts once, since spans are joined to
 * multiranges first; identified airtime is the counted plays within what is held. Spans are then cut at every quarter
 * of an hour: all offsets in use are multiples of it, so a piece never lies in two local hours, whatever clocks do.
 */
export async function sumAirtime(
  connection: Connection,
  scope: Scope,
  days: MonthDays,
): Promise<AirtimeSum[]> {
  const { rows } = await connection.raw<{ rows: AirtimeSum[] }>(
    `with station_months as (?),
     held as (${heldAirtimeSql}),
     music as (
       select station_months.station_id, range_agg(
         tstzrange(
           station_logs.started_at + log_spans.start_ms * interval '1 millisecond',
           station_logs.started_at + log_spans.end_ms * interval '1 millisecond'
         ) * station_logs.airtime * station_months.airtime) as airtime
       from station_months
         join station_logs on station_logs.station_id = station_months.station_id
           and station_logs.airtime && station_months.airtime and station_logs.status <> 'rejected'
         join log_spans on log_spans.log_id = station_logs.id and log_spans.kind = 'music'
       group by station_months.station_id
     ),
     played as (
       select station_months.station_id,
         range_agg(tstzrange(plays.started_at, plays.ended_at) * station_months.airtime) as airtime
       from station_months join plays on plays.station_id = station_months.station_id
         and plays.status = 'counted'
         and plays.started_at >= lower(station_months.airtime) - interval '1 day'
         and plays.started_at < upper(station_months.airtime)
       group by station_months.station_id
     ),
     spans as (
       select station_id, 'held' as kind, unnest(airtime) as span from held
       union all
       select station_id, 'music', unnest(airtime) from music
       union all
       select station_id, 'identified', unnest(played.airtime * held.airtime) from played join held using (station_id)
     ),
     quarters as (
       select spans.station_id, spans.kind, quarter,
         sum(date_part('epoch',
           least(upper(span), quarter + interval '15 minutes') - greatest(lower(span), quarter))) as seconds
       from spans cross join lateral generate_series(
         to_timestamp(floor(date_part('epoch', lower(span)) / 900) * 900), upper(span), interval '15 minutes'
       ) as quarter
       where quarter < upper(span)
       group by spans.station_id, spans.kind, quarter
     ),
     placed as (
       select station_id, kind, seconds, quarter at time zone station_months.time_zone as local_time
       from quarters join station_months using (station_id)
     )
     select station_id as "stationId", local_time::date as day, extract(hour from local_time)::int as hour, kind,
       sum(seconds) as seconds
     from placed
     group by grouping sets
       ((station_id, kind), (local_time::date, kind), (extract(hour from local_time)::int, kind))`,
    [stationMonths(connection, scope, days)],
  )
  return rows
}

export type PlaySum = { stationId: StationId | null; day: string | null; hour: number | null; plays: number }

/** Counted plays by station, by local day and by the local hour in which they began. */
export async function sumPlays(connection: Connection, scope: Scope, days: MonthDays): Promise<PlaySum[]> {
  const { rows } = await connection.raw<{ rows: PlaySum[] }>(
    `with station_months as (?),
     counted as (
       select plays.station_id, plays.local_day,
         extract(hour from plays.started_at at time zone station_months.time_zone)::int as local_hour
       from plays join station_months using (station_id)
       where plays.status = 'counted' and plays.local_day >= ?::date and plays.local_day < ?::date
     )
     select station_id as "stationId", local_day as day, local_hour as hour, count(*)::int as plays
     from counted group by grouping sets ((station_id), (local_day), (local_hour))`,
    [stationMonths(connection, scope, days), days.firstDay, days.nextFirstDay],
  )
  return rows
}
