import {
  createLicence,
  createStation,
  getStation,
  getStationDay,
  getStationMonth,
  listStations,
  updateLicence,
  updateStation,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'
import {
  addDetection,
  addHeard,
  addLog,
  addPlay,
  addRecording,
  addStation,
  auditOf,
  closeMonth,
} from './feature-data.ts'

let api: TestApi
let admin: TestClient
let clerk: TestClient

beforeAll(async () => {
  api = await startTestApi()
  admin = (await api.signInAs('admin')).client
  clerk = (await api.signInAs('clerk')).client
})

const profile = (callName: string) => ({
  callName,
  name: `Radio ${callName}`,
  timeZone: 'Europe/Lisbon',
  contactEmail: '',
})

function licence(validFrom: string, validTo: string | null = null, monthlyFeeMinor = '120000') {
  return { validFrom, validTo, monthlyFeeMinor, worksPartPpm: 600_000 }
}

describe('stations', () => {
  it('are added and changed by administrators, each change on the audit trail', async () => {
    const created = await admin.json(createStation, { body: profile('alpha') })
    expect(created).toMatchObject({
      callName: 'ALPHA',
      contactEmail: null,
      licences: [],
      canUpload: false,
      canEdit: true,
    })
    const params = { stationId: created.id }
    const changed = await admin.json(updateStation, {
      params,
      body: { ...profile('ALPHA'), name: 'Renamed' },
    })
    expect(changed.name).toBe('Renamed')
    expect((await auditOf(api.database, created.id)).map(({ action }) => action)).toEqual([
      'create-station',
      'update-station',
    ])
    expect(await clerk.json(getStation, { params })).toMatchObject({
      name: 'Renamed',
      canUpload: true,
      canEdit: false,
    })
  })

  it('refuse a call name that is taken, at its field and naming who has it', async () => {
    await admin.json(createStation, { body: profile('TAKEN') })
    expect(
      await admin.problem(createStation, { body: { ...profile('TAKEN'), name: 'Another' } }),
    ).toMatchObject({
      code: 'conflict',
      fieldErrors: [{ path: 'callName', message: 'The call name TAKEN belongs to Radio TAKEN.' }],
    })
  })

  it('keep their time zone once logs are held', async () => {
    const stationId = await addStation(api.database)
    const body = { ...profile('MOVED'), timeZone: 'Europe/Athens' }
    expect((await admin.json(updateStation, { params: { stationId }, body })).timeZone).toBe('Europe/Athens')
    await addLog(api.database, { stationId, startedAt: '2026-10-01T00:00:00Z', seconds: 60 })
    const problem = await admin.problem(updateStation, { params: { stationId }, body: profile('MOVED') })
    expect(problem.fieldErrors).toMatchObject([{ path: 'timeZone' }])
  })

  it('are only those of the uploader; others do not exist for them', async () => {
    const [own, other] = [await addStation(api.database), await addStation(api.database)]
    const { client } = await api.signInAs('uploader', { stationIds: [own] })
    expect((await client.json(listStations)).items.map(({ id }) => id)).toEqual([own])
    expect(await client.problem(getStation, { params: { stationId: other } })).toMatchObject({ status: 404 })
    expect(
      await client.problem(getStationDay, { params: { stationId: other, day: '2026-10-01' } }),
    ).toMatchObject({ status: 404 })
    expect(
      await client.problem(getStationMonth, { params: { stationId: other, month: '2026-10' } }),
    ).toMatchObject({ status: 404 })
  })
})

describe('licences', () => {
  it('follow one another and never overlap', async () => {
    const stationId = await addStation(api.database)
    await admin.json(createLicence, { params: { stationId }, body: licence('2026-01-01', '2026-06-30') })
    expect(
      await admin.problem(createLicence, { params: { stationId }, body: licence('2026-06-30') }),
    ).toMatchObject({
      code: 'conflict',
      fieldErrors: [
        {
          path: 'validFrom',
          message:
            'The licence from 2026-01-01 to 2026-06-30 holds some of these days; licences never overlap.',
        },
      ],
    })
    const station = await admin.json(createLicence, { params: { stationId }, body: licence('2026-07-01') })
    expect(station.licences.map(({ validFrom }) => validFrom)).toEqual(['2026-07-01', '2026-01-01'])
    expect(station.licences[0]).toMatchObject({
      monthlyFeeMinor: '120000',
      worksPartPpm: 600_000,
      validTo: null,
    })
  })

  it('cannot change what was paid for a month that is not open', async () => {
    const stationId = await addStation(api.database)
    const { licences } = await admin.json(createLicence, {
      params: { stationId },
      body: licence('2025-01-01'),
    })
    const licenceId = licences[0]?.id ?? ''
    await closeMonth(api.database, '2025-03')
    const change = (body: ReturnType<typeof licence>) =>
      admin.problem(updateLicence, { params: { licenceId }, body })
    expect(await change(licence('2025-01-01', null, '1'))).toMatchObject({ code: 'month-closed' })
    expect(await change(licence('2025-01-01', '2025-03-30'))).toMatchObject({ code: 'month-closed' })
    const ended = await admin.json(updateLicence, {
      params: { licenceId },
      body: licence('2025-01-01', '2025-03-31'),
    })
    expect(ended.licences[0]?.validTo).toBe('2025-03-31')
    const other = await addStation(api.database)
    expect(
      await admin.problem(createLicence, {
        params: { stationId: other },
        body: licence('2025-03-31', '2025-03-31'),
      }),
    ).toMatchObject({
      code: 'month-closed',
    })
  })

  it('refuse negative fees and a last day before the first, all at once', async () => {
    const stationId = await addStation(api.database)
    const problem = await admin.problem(createLicence, {
      params: { stationId },
      body: licence('2026-02-01', '2026-01-01', '-5'),
    })
    expect(problem.code).toBe('validation-failed')
    expect(problem.fieldErrors.map(({ path }) => path)).toContain('monthlyFeeMinor')
  })
})

describe('a station day', () => {
  const logStartedAt = '2026-10-24T22:30:00Z'

  it('has 25 hours when clocks go back, and shows what is held, heard, played, doubtful and unknown', async () => {
    const stationId = await addStation(api.database)
    const logId = await addLog(api.database, { stationId, startedAt: logStartedAt, seconds: 3600 })
    const recordingId = await addRecording(api.database, { title: 'Tune', artist: 'Band' })
    const doubtful = await addRecording(api.database, { title: 'Maybe', artist: 'Band' })
    await addHeard(api.database, logId, [
      { kind: 'silence', from: 0, to: 10 },
      { kind: 'speech', from: 10, to: 1700 },
      { kind: 'music', from: 1700, to: 3600 },
    ])
    const found = { stationId, logId, logStartedAt }
    const play = await addPlay(api.database, { ...found, recordingId, from: 1700, to: 2000 }, '2026-10-24')
    const waiting = await addDetection(
      api.database,
      { ...found, recordingId: doubtful, from: 2009, to: 2500 },
      'review',
    )

    // Lisbon is at UTC+1: the log holds 23:30 to 00:30 local, half an hour on each day.
    const params = { stationId, day: '2026-10-25' }
    const day = await clerk.json(getStationDay, { params })
    expect([day.from, day.to]).toEqual(['2026-10-24T23:00:00.000Z', '2026-10-26T00:00:00.000Z'])
    expect(day).toMatchObject({ heldSeconds: 1800, musicSeconds: 1800, identifiedSeconds: 200 })
    const spans = day.spans.map(({ kind, from, to }) => [kind, from.slice(11, 19), to.slice(11, 19)])
    expect(spans).toEqual([
      ['held', '23:00:00', '23:30:00'],
      ['music', '23:00:00', '23:30:00'],
      ['unidentified', '23:11:40', '23:30:00'],
      ['review', '23:03:29', '23:11:40'],
      ['play', '23:00:00', '23:03:20'],
    ])
    expect(day.spans.at(-1)).toMatchObject({
      label: 'Tune · Band',
      logId,
      playId: play.id,
      detectionId: play.detectionId,
    })
    expect(day.spans.at(-2)).toMatchObject({
      label: 'Maybe · Band',
      logId,
      detectionId: waiting,
      playId: null,
    })
  })

  it('is in the month with the same figures, a play counted on the day it began', async () => {
    const stationId = await addStation(api.database)
    const logId = await addLog(api.database, { stationId, startedAt: logStartedAt, seconds: 3600 })
    const recordingId = await addRecording(api.database)
    await addHeard(api.database, logId, [{ kind: 'music', from: 0, to: 3600 }])
    await addPlay(
      api.database,
      { stationId, logId, logStartedAt, recordingId, from: 1700, to: 2000 },
      '2026-10-24',
    )
    const month = await clerk.json(getStationMonth, { params: { stationId, month: '2026-10' } })
    expect(month.days).toHaveLength(31)
    expect(month.days[23]).toMatchObject({
      day: '2026-10-24',
      heldSeconds: 1800,
      identifiedSeconds: 100,
      plays: 1,
    })
    expect(month.days[24]).toMatchObject({
      day: '2026-10-25',
      heldSeconds: 1800,
      identifiedSeconds: 200,
      plays: 0,
    })
    expect(month.days[24]?.spans.map(({ kind }) => kind)).toEqual(['held', 'music', 'unidentified', 'play'])
    expect(month.days[0]).toMatchObject({ heldSeconds: 0, plays: 0, spans: [] })
  })
})
