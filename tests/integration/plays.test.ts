import { exportPlays, getRecordingPlays, listPlays } from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import {
  buildParty,
  buildRecording,
  buildShare,
  buildWork,
  type BuiltParty,
  type BuiltRecording,
} from '../factories/build-catalogue.ts'
import { buildPlay, type BuiltPlay } from '../factories/build-play.ts'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

let api: TestApi
let clerk: SignedInClient
let station: BuiltStation
let label: BuiltParty
let writer: BuiltParty
let tune: BuiltRecording
let other: BuiltRecording
let early: BuiltPlay
let late: BuiltPlay
let foreign: BuiltPlay
let removed: BuiltPlay

beforeAll(async () => {
  api = await startTestApi()
  const { database } = api
  station = await buildStation(database, { callName: 'MAIN' })
  const second = await buildStation(database, { callName: 'SECOND' })
  label = await buildParty(database, 'Label')
  writer = await buildParty(database, 'Writer')
  const workId = await buildWork(database, 'The work')
  await buildShare(database, { workId }, { party: writer })
  // The label holds its share only until 15 October.
  tune = await buildRecording(database, {
    title: '@Tune',
    workId,
    shares: [{ party: label, validTo: '2026-10-15' }],
  })
  other = await buildRecording(database, { title: 'Other' })
  early = await buildPlay(database, { station, recording: tune, startedAt: '2026-10-15T23:00:00Z' })
  late = await buildPlay(database, {
    station: second,
    recording: tune,
    startedAt: '2026-10-16T00:10:00Z',
    seconds: 60,
  })
  foreign = await buildPlay(database, { station, recording: other, startedAt: '2026-09-10T10:00:00Z' })
  removed = await buildPlay(database, {
    station,
    recording: tune,
    startedAt: '2026-10-20T10:00:00Z',
    status: 'removed',
  })
  clerk = await api.signInAs('clerk')
})

async function idsFor(person: SignedInClient, query: Record<string, string> = {}): Promise<string[]> {
  const page = await person.client.json(listPlays, { query })
  return page.items.map(({ id }) => id).sort()
}

const sorted = (...plays: BuiltPlay[]) => plays.map(({ id }) => id).sort()

describe('the list of plays', () => {
  it('holds everything for clerks, by month, day, status and party', async () => {
    expect(await idsFor(clerk)).toEqual(sorted(early, late, foreign, removed))
    expect(await idsFor(clerk, { month: '2026-09' })).toEqual(sorted(foreign))
    expect(await idsFor(clerk, { day: '2026-10-16' })).toEqual(sorted(late))
    expect(await idsFor(clerk, { status: 'removed' })).toEqual(sorted(removed))
    expect(await idsFor(clerk, { partyId: label.id })).toEqual(sorted(early))
    expect(await idsFor(clerk, { search: 'other' })).toEqual(sorted(foreign))
  })

  it('shows a publisher the plays of days on which their share was valid', async () => {
    const labelDesk = await api.signInAs('publisher', { partyIds: [label.id] })
    expect(await idsFor(labelDesk)).toEqual(sorted(early))
    const writerDesk = await api.signInAs('publisher', { partyIds: [writer.id] })
    expect(await idsFor(writerDesk)).toEqual(sorted(early, late, removed))
    expect(await idsFor(writerDesk, { partyId: label.id })).toEqual(sorted(early))
    const nobody = await api.signInAs('publisher')
    expect(await idsFor(nobody)).toEqual([])
  })

  it('shows an uploader the plays of their stations', async () => {
    const uploader = await api.signInAs('uploader', { stationIds: [station.id] })
    expect(await idsFor(uploader)).toEqual(sorted(early, foreign, removed))
  })

  it('says who may dispute what', async () => {
    const auditor = await api.signInAs('auditor')
    const page = await auditor.client.json(listPlays, { query: { sort: 'startedAt' } })
    expect(page.items.map(({ status, canDispute }) => [status, canDispute])).toEqual([
      ['counted', true],
      ['counted', true],
      ['counted', true],
      ['removed', false],
    ])
    const forClerk = await clerk.client.json(listPlays, {})
    expect(forClerk.items.some(({ canDispute }) => canDispute)).toBe(false)
  })

  it('sorts the same way on every page', async () => {
    const pages = await Promise.all(
      ['1', '2', '3', '4'].map((page) =>
        clerk.client.json(listPlays, { query: { page, pageSize: '1', sort: '-title' } }),
      ),
    )
    expect(pages.flatMap(({ items }) => items.map(({ recording }) => recording.title))).toEqual([
      'Other',
      '@Tune',
      '@Tune',
      '@Tune',
    ])
    expect(new Set(pages.flatMap(({ items }) => items.map(({ id }) => id))).size).toBe(4)
  })
})

describe('the export of plays', () => {
  it('holds the scope of the person alone, with formulas neutralised', async () => {
    const labelDesk = await api.signInAs('publisher', { partyIds: [label.id] })
    const answer = await labelDesk.client.call(exportPlays)
    const lines = answer.text.trimEnd().split('\r\n')
    expect(lines).toHaveLength(2)
    expect(lines[1]).toContain('MAIN,')
    expect(lines[1]).toContain(`2026-10-15,2026-10-15T23:00:00.000Z,2026-10-15T23:03:00.000Z,180,'@Tune`)
  })
})

describe('the play counts of a recording', () => {
  it('go by station and by month', async () => {
    const counts = await clerk.client.json(getRecordingPlays, { params: { recordingId: tune.id } })
    expect(
      counts.stations.map(({ station: { callName }, plays, seconds }) => [callName, plays, seconds]),
    ).toEqual([
      ['MAIN', 1, 180],
      ['SECOND', 1, 60],
    ])
    expect(counts.months).toEqual([{ month: '2026-10', plays: 2, seconds: 240 }])
  })

  it('count for a publisher what lies within their share', async () => {
    const labelDesk = await api.signInAs('publisher', { partyIds: [label.id] })
    const counts = await labelDesk.client.json(getRecordingPlays, { params: { recordingId: tune.id } })
    expect(counts.months).toEqual([{ month: '2026-10', plays: 1, seconds: 180 }])
    const problem = await labelDesk.client.problem(getRecordingPlays, {
      params: { recordingId: other.id },
    })
    expect(problem).toMatchObject({ status: 404, code: 'not-found' })
  })

  it('are not open to uploaders', async () => {
    const uploader = await api.signInAs('uploader', { stationIds: [station.id] })
    const problem = await uploader.client.problem(getRecordingPlays, { params: { recordingId: tune.id } })
    expect(problem.code).toBe('not-allowed')
  })
})
