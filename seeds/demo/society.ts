import { stationIdSchema, type StationId } from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'
import { SOCIETY_NAME, stationPlans } from './invented-names.ts'
import type { DemoMonths } from './months.ts'

export type DemoStation = (typeof stationPlans)[number] & { id: StationId }

/** The society with its rules, and its stations with their licences. */
export async function insertSociety(database: Database, months: DemoMonths): Promise<DemoStation[]> {
  await database('society').update({
    name: SOCIETY_NAME,
    currency: 'EUR',
    currency_digits: 2,
    time_zone: 'Europe/Lisbon',
  })
  const version = `${months.history.year}-1`
  await database('distribution_rules').insert({
    version,
    valid_from: months.history.startOf('year').toISODate(),
    minimum_ms: 10_000,
    cap_ms: 900_000,
  })
  await database('deduction_rules').insert([
    {
      rules_version: version,
      position: 1,
      code: 'administration',
      label: 'Administration',
      rate_ppm: 120_000,
    },
    {
      rules_version: version,
      position: 2,
      code: 'social-cultural',
      label: 'Social and cultural fund',
      rate_ppm: 50_000,
    },
    {
      rules_version: version,
      position: 3,
      code: 'reserve',
      label: 'Reserve for late claims',
      rate_ppm: 20_000,
    },
  ])
  const stations: DemoStation[] = []
  for (const plan of stationPlans) {
    const rows: { id: string }[] = await database('stations')
      .insert({
        call_name: plan.callName,
        name: plan.name,
        time_zone: plan.timeZone,
        contact_email: `logs@${plan.callName.toLowerCase()}.example`,
      })
      .returning('id')
    const id = stationIdSchema.parse(rows[0]?.id)
    await database('licences').insert({
      station_id: id,
      valid_from: months.history.minus({ months: 9 }).toISODate(),
      monthly_fee_minor: plan.monthlyFeeMinor,
      works_part_ppm: plan.worksPartPpm,
    })
    stations.push({ ...plan, id })
  }
  return stations
}
