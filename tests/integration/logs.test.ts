import { analyseLogAgain, getLog, listLogs, type StationId } from '@fieldfare/contracts'
import { writeLogProgress } from '@fieldfare/database'
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
let clerk: TestClient

beforeAll(async () => {
  api = await startTestApi()
  clerk = (await api.signInAs('clerk')).client
})

const logStartedAt = '2026-09-10T08:00:00Z'

function addMorning(stationId: StationId, status = 'analysed') {
  return addLog(api.database, { stationId, startedAt: logStartedAt, seconds: 3600, status })
}

describe('a log', () => {
  it('tells what was heard in it; plays that overlap count once and only within it', async () => {
    const stationId = await addStation(api.database)
    const logId = await addMorning(stationId)
    const [first, second] = [await addRecording(api.database), await addRecording(api.database)]
    await addHeard(api.database, logId, [{ kind: 'music', from: 0, to: 3600 }])
    const found = { stationId, logId, logStartedAt }
    await addPlay(api.database, { ...found, recordingId: first, from: 100, to: 300 }, '2026-09-10')
    await addPlay(api.database, { ...found, recordingId: second, from: 290, to: 400 }, '2026-09-10')
    await addPlay(api.database, { ...found, recordingId: first, from: 3500, to: 3700 }, '2026-09-10')
    await addDetection(api.database, { ...found, recordingId: second, from: 1000, to: 1100 }, 'review')

    const { log, spans } = await clerk.json(getLog, { params: { logId } })
    expect(log).toMatchObject({
      identifiedSeconds: 400,
      detections: 4,
      endedAt: '2026-09-10T09:00:00.000Z',
      canAnalyseAgain: true,
    })
    const kinds = spans.map(({ kind, from, to }) => `${kind} ${from.slice(11, 19)}–${to.slice(11, 19)}`)
    expect(kinds).toEqual([
      'held 08:00:00–09:00:00',
      'music 08:00:00–09:00:00',
      'unidentified 08:00:00–08:01:40',
      'unidentified 08:06:40–08:16:40',
      'unidentified 08:18:20–08:58:20',
      'review 08:16:40–08:18:20',
      'play 08:01:40–08:05:00',
      'play 08:04:50–08:06:40',
      'play 08:58:20–09:00:00',
    ])
  })

  it('shows the progress last heard of while it is in work', async () => {
    const stationId = await addStation(api.database)
    const logId = await addMorning(stationId, 'analysing')
    const params = { logId }
    expect((await clerk.json(getLog, { params })).log.progress).toBeNull()
    const progress = { stage: 'matching', doneSeconds: 120, totalSeconds: 3600, secondsLeft: 30 } as const
    await writeLogProgress(api.dependencies.redis, logId, progress)
    expect((await clerk.json(getLog, { params })).log.progress).toEqual(progress)
    await api.database('station_logs').where({ id: logId }).update({ status: 'analysed' })
    expect((await clerk.json(getLog, { params })).log.progress).toBeNull()
  })

  it('of another station does not exist for an uploader', async () => {
    const [own, other] = [await addStation(api.database), await addStation(api.database)]
    const [ownLog, otherLog] = [await addMorning(own), await addMorning(other)]
    const { client } = await api.signInAs('uploader', { stationIds: [own] })
    expect((await client.json(listLogs)).items.map(({ id }) => id)).toEqual([ownLog])
    expect((await client.json(listLogs, { query: { stationId: other } })).total).toBe(0)
    expect(await client.problem(getLog, { params: { logId: otherLog } })).toMatchObject({ status: 404 })
    expect((await client.json(getLog, { params: { logId: ownLog } })).log.canAnalyseAgain).toBe(false)
  })
})

describe('the list of logs', () => {
  it('is filtered by month of the station, by state, and sorted', async () => {
    const stationId = await addStation(api.database, 'America/Santiago')
    const at = (startedAt: string, seconds: number, status?: string) =>
      addLog(api.database, { stationId, startedAt, seconds, ...(status === undefined ? {} : { status }) })
    // Santiago is three hours behind UTC: the first of these is still October there.
    const october = await at('2026-11-01T02:00:00Z', 600)
    const november = await at('2026-11-01T03:00:00Z', 1200)
    const refused = await at('2026-11-02T03:00:00Z', 900, 'rejected')
    const find = async (query: Record<string, string>) =>
      (await clerk.json(listLogs, { query: { stationId, ...query } })).items.map(({ id }) => id)
    expect(await find({ month: '2026-10' })).toEqual([october])
    expect(await find({ month: '2026-11', sort: 'startedAt' })).toEqual([november, refused])
    expect(await find({ status: 'rejected' })).toEqual([refused])
    expect(await find({ sort: '-durationSeconds' })).toEqual([november, refused, october])
    const { items } = await clerk.json(listLogs, { query: { stationId, status: 'rejected' } })
    expect(items[0]?.failure).toEqual({ code: 'test', message: 'Made to fail.' })
  })
})

describe('analysing again', () => {
  it('queues another job each time, and only when the one before has ended', async () => {
    const stationId = await addStation(api.database)
    const logId = await addMorning(stationId, 'failed')
    const params = { logId }
    expect(await clerk.json(analyseLogAgain, { params })).toMatchObject({ status: 'queued', failure: null })
    expect(await clerk.problem(analyseLogAgain, { params })).toMatchObject({ status: 409, code: 'conflict' })
    await api
      .database('station_logs')
      .where({ id: logId })
      .update({ status: 'failed', failure_code: 'x', failure_message: 'x' })
    await clerk.json(analyseLogAgain, { params })
    const jobs: unknown[] = await api
      .database('jobs')
      .where('dedupe_key', 'like', `analyse-log-${logId}-%`)
      .select('id')
    expect(jobs).toHaveLength(2)
    expect((await auditOf(api.database, logId)).map(({ action }) => action)).toEqual([
      'analyse-log-again',
      'analyse-log-again',
    ])
  })

  it('needs the audio, a log that was taken, and an open month', async () => {
    const stationId = await addStation(api.database)
    const expired = await addMorning(stationId)
    await api.database('station_logs').where({ id: expired }).update({ storage_key: null })
    expect(await clerk.problem(analyseLogAgain, { params: { logId: expired } })).toMatchObject({
      code: 'audio-expired',
      status: 410,
    })
    const refused = await addLog(api.database, {
      stationId,
      startedAt: '2026-09-12T08:00:00Z',
      seconds: 60,
      status: 'rejected',
    })
    expect(await clerk.problem(analyseLogAgain, { params: { logId: refused } })).toMatchObject({
      code: 'conflict',
    })
    const closed = await addLog(api.database, { stationId, startedAt: '2025-04-12T08:00:00Z', seconds: 60 })
    await closeMonth(api.database, '2025-04')
    expect(await clerk.problem(analyseLogAgain, { params: { logId: closed } })).toMatchObject({
      code: 'month-closed',
    })
    expect((await clerk.json(getLog, { params: { logId: closed } })).log.canAnalyseAgain).toBe(false)
  })
})
