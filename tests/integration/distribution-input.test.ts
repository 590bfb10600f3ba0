import { createDatabase, listMonthPlays, type Database } from '@fieldfare/database'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { buildRecording } from '../factories/build-catalogue.ts'
import { buildPlay } from '../factories/build-play.ts'
import { buildStation } from '../factories/build-station.ts'
import { createTestDatabase } from '../support/index.ts'

let database: Database

beforeAll(async () => {
  database = createDatabase({ databaseUrl: (await createTestDatabase()).url, applicationName: 'input-test' })
})

afterAll(() => database.destroy())

it('a play on a day without a licence takes nothing from the fee of the other days', async () => {
  const station = await buildStation(database, { timeZone: 'Europe/Lisbon' })
  await database('licences').where({ station_id: station.id }).delete()
  await database('licences').insert({
    station_id: station.id,
    valid_from: '2026-10-16',
    valid_to: '2026-10-30',
    monthly_fee_minor: 10_000n,
    works_part_ppm: 500_000,
  })
  const recording = await buildRecording(database)
  const playAt = async (startedAt: string) =>
    (await buildPlay(database, { station, recording, startedAt })).id
  await playAt('2026-10-15T12:00:00.000Z')
  // Half past midnight of the first licensed day in Lisbon is still the day before in UTC.
  const first = await playAt('2026-10-15T23:30:00.000Z')
  const last = await playAt('2026-10-30T23:50:00.000Z')
  await playAt('2026-10-31T00:10:00.000Z')
  const ids = (await listMonthPlays(database, '2026-10-01')).map(({ id }) => id)
  expect(ids.sort()).toEqual([first, last].sort())
})
