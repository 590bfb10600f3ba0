import { stationIdSchema, type StationId } from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'
import { inserted, nextNumber } from './unique.ts'

export type BuiltStation = { id: StationId; callName: string; name: string; timeZone: string }

export type StationSettings = {
  timeZone?: string
  callName?: string
  name?: string
  /** A licence for ever from 2020 on unless false. */
  licence?: { validFrom: string; validTo: string | null } | false
}

/** A station with an open-ended licence. */
export async function buildStation(
  database: Database,
  settings: StationSettings = {},
): Promise<BuiltStation> {
  const number = nextNumber()
  const station = {
    callName: settings.callName ?? `ST-${number}`,
    name: settings.name ?? `Station ${number}`,
    timeZone: settings.timeZone ?? 'UTC',
  }
  const rows: { id: string }[] = await database('stations')
    .insert({ call_name: station.callName, name: station.name, time_zone: station.timeZone })
    .returning('id')
  const id = stationIdSchema.parse(inserted(rows).id)
  if (settings.licence !== false) {
    await database('licences').insert({
      station_id: id,
      valid_from: settings.licence?.validFrom ?? '2020-01-01',
      valid_to: settings.licence?.validTo ?? null,
      monthly_fee_minor: 100_000,
      works_part_ppm: 500_000,
    })
  }
  return { id, ...station }
}
