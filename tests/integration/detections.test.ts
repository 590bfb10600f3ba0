import {
  exportDetections,
  getDetection,
  listDetections,
  reviewDetection,
  type DetectionId,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildRecording, type BuiltRecording } from '../factories/build-catalogue.ts'
import { buildDetection, type BuiltDetection } from '../factories/build-detection.ts'
import { buildLog } from '../factories/build-log.ts'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

let api: TestApi
let clerk: SignedInClient
let uploader: SignedInClient
let station: BuiltStation
let tune: BuiltRecording
let accepted: BuiltDetection
let doubtful: BuiltDetection
let elsewhere: BuiltDetection

async function playsOf(detectionId: DetectionId): Promise<{ status: string; localDay: string }[]> {
  const rows: { status: string; localDay: string }[] = await api
    .database('plays')
    .where({ detection_id: detectionId })
    .select('status', { localDay: 'local_day' })
  return rows
}

async function playEventsOf(detectionId: DetectionId): Promise<{ kind: string; reason: string | null }[]> {
  const rows: { kind: string; reason: string | null }[] = await api
    .database('play_events')
    .join('plays', 'plays.id', 'play_events.play_id')
    .where({ detection_id: detectionId })
    .orderBy('play_events.id')
    .select('play_events.kind', 'play_events.reason')
  return rows
}

beforeAll(async () => {
  api = await startTestApi()
  const { database } = api
  // UTC−3 in October: an evening in Buenos Aires is the next day in UTC.
  station = await buildStation(database, { timeZone: 'America/Argentina/Buenos_Aires' })
  const otherStation = await buildStation(database)
  tune = await buildRecording(database, { title: '=SUM(A1)', artist: 'Band "One"' })
  const second = await buildRecording(database, { title: 'Another tune' })
  const logId = await buildLog(database, { station, startedAt: '2026-10-31T20:00:00Z', seconds: 36_000 })
  const otherLogId = await buildLog(database, { station: otherStation, startedAt: '2026-10-31T20:00:00Z' })
  accepted = await buildDetection(database, {
    station,
    recording: tune,
    logId,
    startedAt: '2026-11-01T01:00:00Z',
    logStartSeconds: 18_000,
  })
  doubtful = await buildDetection(database, {
    station,
    recording: second,
    logId,
    startedAt: '2026-11-01T02:30:00Z',
    logStartSeconds: 23_400,
    decision: 'review',
    confidence: 3,
  })
  elsewhere = await buildDetection(database, {
    station: otherStation,
    recording: tune,
    logId: otherLogId,
    startedAt: '2026-10-31T20:10:00Z',
  })
  clerk = await api.signInAs('clerk')
  uploader = await api.signInAs('uploader', { stationIds: [station.id] })
})

describe('the list of detections', () => {
  it('goes by the days of the station', async () => {
    const october = await clerk.client.json(listDetections, { query: { month: '2026-10' } })
    expect(october.items.map(({ id }) => id).sort()).toEqual([accepted.id, doubtful.id, elsewhere.id].sort())
    const november = await clerk.client.json(listDetections, { query: { month: '2026-11' } })
    expect(november.total).toBe(0)
    const day = await clerk.client.json(listDetections, {
      query: { day: '2026-10-31', stationId: station.id, sort: 'startedAt' },
    })
    expect(day.items.map(({ id }) => id)).toEqual([accepted.id, doubtful.id])
  })

  it('filters by state and by what is written on the record', async () => {
    const waiting = await clerk.client.json(listDetections, { query: { state: 'waiting' } })
    expect(waiting.items.map(({ id }) => id)).toEqual([doubtful.id])
    const named = await clerk.client.json(listDetections, { query: { search: 'another TUNE' } })
    expect(named.items.map(({ id }) => id)).toEqual([doubtful.id])
    const wildcard = await clerk.client.json(listDetections, { query: { search: '%' } })
    expect(wildcard.total).toBe(0)
    const coded = await clerk.client.json(listDetections, {
      query: { search: `${tune.isrc.slice(0, 5)}-${tune.isrc.slice(5)}`, stationId: station.id },
    })
    expect(coded.items.map(({ id }) => id)).toEqual([accepted.id])
  })

  it('gives every row exactly once over its pages, whatever the sort', async () => {
    for (const sort of ['-startedAt', 'confidence', '-durationSeconds', 'title', 'station']) {
      const ids: string[] = []
      for (const page of ['1', '2', '3']) {
        const answer = await clerk.client.json(listDetections, { query: { page, pageSize: '1', sort } })
        expect(answer.total).toBe(3)
        ids.push(...answer.items.map(({ id }) => id))
      }
      expect(new Set(ids).size).toBe(3)
    }
  })

  it('shows uploaders their stations alone', async () => {
    const list = await uploader.client.json(listDetections, {})
    expect(list.items.map(({ id }) => id).sort()).toEqual([accepted.id, doubtful.id].sort())
    const problem = await uploader.client.problem(getDetection, {
      params: { detectionId: elsewhere.id },
    })
    expect(problem.code).toBe('not-found')
  })

  it('names every wrong filter', async () => {
    const problem = await clerk.client.problem(listDetections, {
      query: { month: '2026-13', sort: 'evidence' },
    })
    expect(problem.fieldErrors.map(({ path }) => path).sort()).toEqual(['month', 'sort'])
  })
})

describe('the export of detections', () => {
  it('holds all rows of the filter and no cell a spreadsheet would run', async () => {
    const answer = await clerk.client.call(exportDetections, {
      query: { stationId: station.id, sort: 'startedAt' },
    })
    expect(answer.status).toBe(200)
    expect(answer.headers.get('content-type')).toBe('text/csv; charset=utf-8')
    expect(answer.headers.get('content-disposition')).toContain('filename="detections.csv"')
    const lines = answer.text.replace(/^\uFEFF/, '').split('\r\n')
    expect(lines).toHaveLength(4)
    expect(lines[0]).toContain('Station,Station name,Started at (UTC)')
    expect(lines[1]).toContain(
      `2026-11-01T01:00:00.000Z,2026-11-01T01:03:00.000Z,180,'=SUM(A1),"Band ""One"""`,
    )
    expect(lines[2]).toContain('Another tune')
  })

  it('is as long as the list however long that is', async () => {
    await api.database.raw(
      `insert into recordings (isrc, title, artist)
       select 'ZZLNG26' || lpad(n::text, 5, '0'), 'Long ' || n, 'Many' from generate_series(1, 2500) n`,
    )
    await api.database.raw(
      `insert into detections (id, started_at, ended_at, log_id, station_id, recording_id, engine_version,
         log_start_ms, log_end_ms, reference_start_ms, speed_ratio, confidence, expected_false_alarms, decision,
         agreeing_hashes, evidence)
       select gen_random_uuid(), '2026-10-05T00:00Z', '2026-10-05T00:01Z', d.log_id, d.station_id, r.id, 'test', 1, 60000,
         0, 1, 9, 1e-9, 'review', 5, '[]'
       from recordings r cross join (select log_id, station_id from detections where id = ?) d
       where r.artist = 'Many'`,
      [accepted.id],
    )
    const answer = await clerk.client.call(exportDetections, { query: { day: '2026-10-04' } })
    const lines = answer.text.trimEnd().split('\r\n')
    expect(lines).toHaveLength(2501)
    expect(new Set(lines).size).toBe(2501)
  })
})

describe('one detection', () => {
  it('shows what backs it and what happened to it', async () => {
    const detail = await clerk.client.json(getDetection, { params: { detectionId: accepted.id } })
    expect(detail).toMatchObject({
      reviewState: 'accepted',
      logStartSeconds: 18_000,
      referenceStartSeconds: 2.5,
      durationSeconds: 180,
      agreeingHashes: 42,
      evidence: [{ logSeconds: 18_001, referenceSeconds: 3.5 }],
      hasReferenceAudio: false,
      isMonthOpen: true,
      canReview: true,
      canDispute: false,
      play: { status: 'counted' },
    })
    expect(detail.history.map(({ what }) => what).sort()).toEqual(['Found and accepted', 'Play counted'])
    const auditor = await api.signInAs('auditor')
    const forAuditor = await auditor.client.json(getDetection, { params: { detectionId: accepted.id } })
    expect(forAuditor).toMatchObject({ canReview: false, canDispute: true })
  })
})

describe('reviewing a detection', () => {
  const review = (detectionId: DetectionId, outcome: string, reason = '') => ({
    params: { detectionId },
    body: { outcome, reason },
  })

  it('confirmed makes its play, on the day of the station, with events and audit trail', async () => {
    const detail = await clerk.client.json(reviewDetection, review(doubtful.id, 'confirmed'))
    expect(detail).toMatchObject({ reviewState: 'confirmed', play: { status: 'counted' } })
    expect(await playsOf(doubtful.id)).toEqual([{ status: 'counted', localDay: '2026-10-31' }])
    expect(await playEventsOf(doubtful.id)).toEqual([{ kind: 'created', reason: null }])
    const trail: { action: string }[] = await api
      .database('audit_events')
      .where({ subject_id: doubtful.id })
      .select('action')
    expect(trail).toEqual([{ action: 'confirm-detection' }])
  })

  it('the same way twice is refused', async () => {
    const problem = await clerk.client.problem(reviewDetection, review(doubtful.id, 'confirmed'))
    expect(problem).toMatchObject({ code: 'conflict', status: 409 })
  })

  it('rejected removes the play with its reason, confirmed again restores it', async () => {
    await clerk.client.json(reviewDetection, review(doubtful.id, 'rejected', 'It is a jingle.'))
    expect(await playsOf(doubtful.id)).toEqual([{ status: 'removed', localDay: '2026-10-31' }])
    await clerk.client.json(reviewDetection, review(doubtful.id, 'confirmed', 'It is not.'))
    expect(await playEventsOf(doubtful.id)).toEqual([
      { kind: 'created', reason: null },
      { kind: 'removed', reason: 'It is a jingle.' },
      { kind: 'restored', reason: 'It is not.' },
    ])
  })

  it('rejected needs a reason', async () => {
    const problem = await clerk.client.problem(reviewDetection, review(doubtful.id, 'rejected', '  '))
    expect(problem.fieldErrors).toEqual([{ path: 'reason', message: 'Say why it is rejected.' }])
  })

  it('by two clerks at once takes one answer', async () => {
    const second = await api.signInAs('clerk')
    const answers = await Promise.all(
      [clerk, second].map(({ client }) =>
        client.call(reviewDetection, review(accepted.id, 'rejected', 'Not ours.')),
      ),
    )
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect((await playEventsOf(accepted.id)).map(({ kind }) => kind)).toEqual(['created', 'removed'])
  })

  it('is refused in words where another play covers the airtime', async () => {
    const clash = await buildDetection(api.database, {
      station,
      recording: tune,
      logId: await buildLog(api.database, { station, startedAt: '2026-11-20T00:00:00Z' }),
      startedAt: '2026-11-20T00:10:00Z',
    })
    const { rows } = await api.database.raw<{ rows: { id: DetectionId }[] }>(
      `insert into detections (id, started_at, ended_at, log_id, station_id, recording_id, engine_version,
         log_start_ms, log_end_ms, reference_start_ms, speed_ratio, confidence, expected_false_alarms, decision,
         agreeing_hashes, evidence)
       select gen_random_uuid(), started_at + interval '1 minute', ended_at, log_id, station_id, recording_id,
         engine_version, 3000000, 3100000, 0, 1, 3, 1e-3, 'review', 5, '[]' from detections where id = ? returning id`,
      [clash.id],
    )
    const [doubled] = rows
    if (doubled === undefined) throw new Error('The second detection was not inserted')
    const problem = await clerk.client.problem(reviewDetection, review(doubled.id, 'confirmed'))
    expect(problem.code).toBe('conflict')
    expect(problem.detail).toContain('Another play of this recording')
  })

  it('is refused in a month that is not open, and leaves nothing behind', async () => {
    const closed = await buildDetection(api.database, {
      station,
      recording: tune,
      logId: await buildLog(api.database, { station, startedAt: '2026-08-10T00:00:00Z' }),
      startedAt: '2026-08-10T00:10:00Z',
    })
    await api.database('distribution_months').insert({ month: '2026-08-01', status: 'calculated' })
    const problem = await clerk.client.problem(reviewDetection, review(closed.id, 'rejected', 'Wrong.'))
    expect(problem).toMatchObject({ code: 'month-closed', status: 409 })
    expect(problem.detail).toBe(
      'The plays of August 2026 cannot be changed. It is calculated. Return it to open first.',
    )
    expect(await playsOf(closed.id)).toMatchObject([{ status: 'counted' }])
    const reviews: unknown[] = await api.database('detection_reviews').where({ detection_id: closed.id })
    expect(reviews).toEqual([])
    const detail = await clerk.client.json(getDetection, { params: { detectionId: closed.id } })
    expect(detail).toMatchObject({ isMonthOpen: false, canReview: false })
  })

  it('is for clerks', async () => {
    const problem = await uploader.client.problem(reviewDetection, review(accepted.id, 'confirmed'))
    expect(problem.code).toBe('not-allowed')
  })
})
