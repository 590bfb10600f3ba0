import { getMonthOverview, listMonths, monthSchema } from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { readCoverage } from '../../apps/api/src/records/coverage.repository.ts'
import { daysOfMonth } from '../../apps/api/src/records/months.ts'
import { buildParty, buildRecording } from '../factories/build-catalogue.ts'
import { buildDetection } from '../factories/build-detection.ts'
import { buildLog } from '../factories/build-log.ts'
import { buildPlay } from '../factories/build-play.ts'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

/**
 * A month small enough to add up by hand. Lisbon put clocks forward on 2026-03-29 at 01:00, Kathmandu is 5:45 ahead of
 * UTC all year (IANA time zone database).
 */
let api: TestApi
let clerk: SignedInClient
let lisbon: BuiltStation
let kathmandu: BuiltStation

const MARCH = { params: { month: '2026-03' } }
const HOUR = 3600

beforeAll(async () => {
  api = await startTestApi()
  const { database } = api
  lisbon = await buildStation(database, { timeZone: 'Europe/Lisbon', callName: 'AAA' })
  kathmandu = await buildStation(database, {
    timeZone: 'Asia/Kathmandu',
    callName: 'BBB',
    licence: { validFrom: '2026-03-11', validTo: null },
  })
  const tune = await buildRecording(database, { title: 'Tune' })
  const second = await buildRecording(database, { title: 'Second' })

  // The whole day of the clock change: 23 hours, with two hours of music from 10:00 local time on.
  const day = await buildLog(database, {
    station: lisbon,
    startedAt: '2026-03-29T00:00:00Z',
    seconds: 23 * HOUR,
    music: [[9 * HOUR, 11 * HOUR]],
  })
  // Both count until the minute in which one fades into the other, which is one minute of airtime: 5 + 5 − 1.
  await buildPlay(database, {
    station: lisbon,
    recording: tune,
    startedAt: '2026-03-29T09:55:00Z',
    seconds: 300,
  })
  await buildPlay(database, {
    station: lisbon,
    recording: second,
    startedAt: '2026-03-29T09:59:00Z',
    seconds: 300,
  })
  await buildPlay(database, {
    station: lisbon,
    recording: second,
    startedAt: '2026-03-29T12:00:00Z',
    status: 'removed',
  })
  await buildDetection(database, {
    station: lisbon,
    recording: tune,
    logId: day,
    startedAt: '2026-03-29T15:00:00Z',
    decision: 'review',
    logStartSeconds: 15 * HOUR,
  })

  // 23:00 of 28 February to 01:00 of 1 March local time: one hour of it is March. The play begins at 00:30.
  await buildLog(database, {
    station: kathmandu,
    startedAt: '2026-02-28T17:15:00Z',
    seconds: 2 * HOUR,
    music: [[0, 2 * HOUR]],
  })
  await buildPlay(database, {
    station: kathmandu,
    recording: tune,
    startedAt: '2026-02-28T18:45:00Z',
    // Half an hour of log is left; the play goes on for 10 minutes after it.
    seconds: 40 * 60,
  })
  await buildLog(database, { station: kathmandu, startedAt: '2026-03-05T00:00:00Z', status: 'queued' })
  await buildLog(database, { station: kathmandu, startedAt: '2026-03-06T00:00:00Z', status: 'rejected' })
  clerk = await api.signInAs('clerk')
})

describe('the overview of a month', () => {
  it('adds up each station in its own zone', async () => {
    const { stations } = await clerk.client.json(getMonthOverview, MARCH)
    expect(stations).toMatchObject([
      {
        station: { callName: 'AAA' },
        heldSeconds: 23 * HOUR,
        musicSeconds: 2 * HOUR,
        identifiedSeconds: 9 * 60,
        plays: 2,
        // 31 days less the hour that clocks left out.
        expectedSeconds: (31 * 24 - 1) * HOUR,
        logs: 1,
        waitingForReview: 1,
      },
      {
        station: { callName: 'BBB' },
        heldSeconds: HOUR,
        musicSeconds: HOUR,
        identifiedSeconds: HOUR / 2,
        plays: 1,
        // Licensed from the 11th on.
        expectedSeconds: 21 * 24 * HOUR,
        logs: 2,
        waitingForReview: 0,
      },
    ])
  })

  it('sums the stations, and each breakdown comes to the same', async () => {
    const { totals, days, hours, status } = await clerk.client.json(getMonthOverview, MARCH)
    expect(status).toBe('open')
    expect(totals).toEqual({
      heldSeconds: 24 * HOUR,
      musicSeconds: 3 * HOUR,
      identifiedSeconds: 39 * 60,
      plays: 3,
      expectedSeconds: (31 * 24 - 1 + 21 * 24) * HOUR,
      waitingForReview: 1,
      openDisputes: 0,
      logsInWork: 1,
      logsRefused: 1,
    })
    for (const parts of [days, hours]) {
      for (const key of ['heldSeconds', 'musicSeconds', 'identifiedSeconds', 'plays'] as const) {
        expect(parts.reduce((sum, part) => sum + part[key], 0)).toBeCloseTo(totals[key], 6)
      }
    }
  })

  it('has every day, the one of 23 hours too', async () => {
    const { days } = await clerk.client.json(getMonthOverview, MARCH)
    expect(days).toHaveLength(31)
    expect(days[0]).toEqual({
      day: '2026-03-01',
      heldSeconds: HOUR,
      musicSeconds: HOUR,
      identifiedSeconds: HOUR / 2,
      plays: 1,
    })
    expect(days[28]).toMatchObject({ day: '2026-03-29', heldSeconds: 23 * HOUR, plays: 2 })
    expect(days[29]).toMatchObject({ day: '2026-03-30', heldSeconds: 0, plays: 0 })
  })

  it('splits hours where clocks struck, and leaves out the hour that never was', async () => {
    const { hours } = await clerk.client.json(getMonthOverview, MARCH)
    expect(hours.map(({ hour }) => hour)).toEqual(Array.from({ length: 24 }, (_, hour) => hour))
    const seconds = (hour: number) => hours[hour]
    // Midnight: an hour of each station. One o'clock was left out in Lisbon.
    expect(seconds(0)).toMatchObject({ heldSeconds: 2 * HOUR, musicSeconds: HOUR, plays: 1 })
    expect(seconds(1)).toMatchObject({ heldSeconds: 0, plays: 0 })
    expect(seconds(2)).toMatchObject({ heldSeconds: HOUR })
    // 09:55 UTC is 10:55 in Lisbon by then: five minutes of identified airtime before eleven, four after.
    expect(seconds(10)).toMatchObject({ musicSeconds: HOUR, identifiedSeconds: 300, plays: 2 })
    expect(seconds(11)).toMatchObject({ musicSeconds: HOUR, identifiedSeconds: 240, plays: 0 })
  })

  it('ranks the recordings', async () => {
    const { topRecordings } = await clerk.client.json(getMonthOverview, MARCH)
    expect(topRecordings.map(({ recording, plays, seconds }) => [recording.title, plays, seconds])).toEqual([
      ['Tune', 2, 300 + 40 * 60],
      ['Second', 1, 300],
    ])
  })

  it('is that of their stations for an uploader', async () => {
    const uploader = await api.signInAs('uploader', { stationIds: [kathmandu.id] })
    const overview = await uploader.client.json(getMonthOverview, MARCH)
    expect(overview.stations.map(({ station }) => station.callName)).toEqual(['BBB'])
    expect(overview.totals).toMatchObject({ heldSeconds: HOUR, plays: 1, waitingForReview: 0 })
    expect(overview.topRecordings).toMatchObject([{ recording: { title: 'Tune' }, plays: 1 }])
  })

  it('expects no more than what has passed in a month that still runs', async () => {
    const days = daysOfMonth(monthSchema.parse('2026-03'))
    const coverage = await readCoverage(api.database, { kind: 'all' }, days, new Date('2026-03-29T12:00:00Z'))
    expect(coverage.map(({ callName, expectedSeconds }) => [callName, expectedSeconds])).toEqual([
      ['AAA', (28 * 24 + 12) * HOUR],
      // From 11 March 00:00 to 29 March 17:45 in Kathmandu.
      ['BBB', (18 * 24 + 17.75) * HOUR],
    ])
  })
})

describe('the list of months', () => {
  it('has months with logs or plays in scope and the one the desk works on', async () => {
    const all = await clerk.client.json(listMonths)
    expect(all.items.map(({ month }) => month)).toEqual(
      [...new Set([all.current, '2026-03', '2026-02'])].sort().reverse(),
    )
    expect(all.items.every(({ status }) => status === 'open')).toBe(true)
    const uploader = await api.signInAs('uploader', { stationIds: [lisbon.id] })
    const theirs = await uploader.client.json(listMonths)
    expect(theirs.items.map(({ month }) => month)).toEqual([all.current, '2026-03'])
    const party = await buildParty(api.database)
    const publisher = await api.signInAs('publisher', { partyIds: [party.id] })
    expect((await publisher.client.json(listMonths)).items.map(({ month }) => month)).toEqual([all.current])
  })
})
