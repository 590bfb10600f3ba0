import { restrictToStations, type Connection, type Scope } from '@fieldfare/database'
import type { Knex } from 'knex'
import type { MonthDays } from './months.ts'

/** A month as each station in scope has it: from its own midnight to its own midnight. For `with station_months as (?)`. */
export function stationMonths(connection: Connection, scope: Scope, days: MonthDays): Knex.QueryBuilder {
  const query = connection('stations').select(
    'stations.id as station_id',
    'stations.time_zone',
    connection.raw(
      `tstzrange(?::date::timestamp at time zone stations.time_zone,
         ?::date::timestamp at time zone stations.time_zone) as airtime`,
      [days.firstDay, days.nextFirstDay],
    ),
  )
  return restrictToStations(query, scope, 'stations.id')
}

/**
 * The airtime a log is held for; expects `station_months` before it. What was refused is not held.
 */
export const heldAirtimeSql = `select station_months.station_id,
    range_agg(station_logs.airtime * station_months.airtime) as airtime
  from station_months join station_logs on station_logs.station_id = station_months.station_id
    and station_logs.airtime && station_months.airtime and station_logs.status <> 'rejected'
  group by station_months.station_id`

/** Length of a column of ranges in one multirange column, in seconds. */
const secondsOfMultirange = (column: string) => `coalesce((
  select sum(date_part('epoch', upper(span) - lower(span))) from unnest(${column}) as spans(span)
), 0)`

export type StationCoverage = {
  stationId: string
  callName: string
  heldSeconds: number
  expectedSeconds: number
}

/**
 * What is held and what should be: the seconds of all days a licence covers, up to now in a month that still runs.
 * Only stations with a licence or a log in the month, by call name.
 */
export async function readCoverage(
  connection: Connection,
  scope: Scope,
  days: MonthDays,
  now: Date,
): Promise<StationCoverage[]> {
  const { rows } = await connection.raw<{ rows: StationCoverage[] }>(
    `with station_months as (?),
     held as (${heldAirtimeSql}),
     licensed as (
       select station_months.station_id, range_agg(
         tstzrange(
           greatest(licences.valid_from, ?::date)::timestamp at time zone station_months.time_zone,
           least(coalesce(licences.valid_to + 1, ?::date), ?::date)::timestamp at time zone station_months.time_zone
         ) * tstzrange(null, ?)) as airtime
       from station_months join licences on licences.station_id = station_months.station_id
         and licences.valid_from < ?::date and (licences.valid_to is null or licences.valid_to >= ?::date)
       group by station_months.station_id
     )
     select stations.id as "stationId", stations.call_name as "callName",
       ${secondsOfMultirange('held.airtime')} as "heldSeconds",
       ${secondsOfMultirange('licensed.airtime')} as "expectedSeconds"
     from station_months join stations on stations.id = station_months.station_id
       left join held on held.station_id = stations.id
       left join licensed on licensed.station_id = stations.id
     where held.station_id is not null or licensed.station_id is not null
     order by stations.call_name`,
    [
      stationMonths(connection, scope, days),
      days.firstDay,
      days.nextFirstDay,
      days.nextFirstDay,
      now,
      days.nextFirstDay,
      days.firstDay,
    ],
  )
  return rows
}
