import type { AirtimeKind, LocalDate, Month, StationId } from '@fieldfare/contracts'
import type { Database, Scope } from '@fieldfare/database'
import {
  airtimeTotals,
  clipAirtime,
  intervalsByKind,
  presentSpans,
  readAirtime,
} from '../../airtime/airtime.ts'
import { unionOf } from '../../airtime/intervals.ts'
import { boundsOfDay, daysOfMonth } from '../../airtime/local-time.ts'
import { notFound } from '../../http/app-error.ts'
import { findStation } from './stations.repository.ts'

/** On a ribbon a month thin, half a minute is less than a pixel. Gaps in what is held are never hidden. */
const RIBBON_JOIN_MS = 30_000

const joinOf = (kind: AirtimeKind) => (kind === 'held' ? 0 : RIBBON_JOIN_MS)

export function createStationAirtimeService({ database }: { database: Database }) {
  async function zoneOf(scope: Scope, stationId: StationId): Promise<string> {
    const station = await findStation(database, scope, stationId)
    if (station === null) throw notFound('This station')
    return station.timeZone
  }

  async function readDay(scope: Scope, stationId: StationId, day: LocalDate) {
    const timeZone = await zoneOf(scope, stationId)
    const bounds = boundsOfDay(day, timeZone)
    const airtime = await readAirtime(database, { stationId, ...bounds })
    return {
      day,
      timeZone,
      from: new Date(bounds.fromMs).toISOString(),
      to: new Date(bounds.toMs).toISOString(),
      ...airtimeTotals(airtime),
      spans: presentSpans(airtime),
    }
  }

  async function readMonth(scope: Scope, stationId: StationId, month: Month) {
    const timeZone = await zoneOf(scope, stationId)
    const days = daysOfMonth(month, timeZone)
    const [first, last] = [days.at(0), days.at(-1)]
    if (first === undefined || last === undefined) throw new Error(`${month} has no days`)
    const whole = await readAirtime(database, { stationId, fromMs: first.fromMs, toMs: last.toMs })
    return {
      month,
      timeZone,
      days: days.map((bounds) => {
        const airtime = clipAirtime(whole, bounds)
        const { heldSeconds, identifiedSeconds } = airtimeTotals(airtime)
        return {
          day: bounds.day,
          from: new Date(bounds.fromMs).toISOString(),
          to: new Date(bounds.toMs).toISOString(),
          heldSeconds,
          identifiedSeconds,
          // A play that runs past midnight belongs to the day it began on.
          plays: airtime.plays.filter(({ localDay }) => localDay === bounds.day).length,
          spans: intervalsByKind(airtime).flatMap(([kind, intervals]) =>
            unionOf(intervals, joinOf(kind)).map(({ fromMs, toMs }) => ({
              kind,
              from: new Date(fromMs).toISOString(),
              to: new Date(toMs).toISOString(),
            })),
          ),
        }
      }),
    }
  }

  return { readDay, readMonth }
}
