import { uploadLog, type StationId } from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'
import { addLog, addStation, auditOf, closeMonth, formWith, toneWave } from './feature-data.ts'

let api: TestApi
let clerk: TestClient
let stationId: StationId
let hertz = 200

beforeAll(async () => {
  api = await startTestApi()
  clerk = (await api.signInAs('clerk')).client
  stationId = await addStation(api.database)
})

/** A recording nobody has sent yet. */
function freshTone(): Blob {
  hertz += 1
  return toneWave(1, hertz)
}

function start(startedAtLocal: string, more: Record<string, string> = {}): Record<string, string> {
  return { startedAtLocal, timeZone: 'Europe/Lisbon', ...more }
}

type Sent = { form: FormData; params: { stationId: StationId } }

function sending(
  file: Blob | string,
  fields: Record<string, string>,
  station = stationId,
  name = 'log.wav',
): Sent {
  return { form: formWith(file, name, fields), params: { stationId: station } }
}

async function storedObjects(): Promise<number> {
  return (await api.dependencies.storage.usage()).objects
}

describe('a log that is sent', () => {
  it('is stored, on the record, queued and on the audit trail, all of them', async () => {
    const { client, user } = await api.signInAs('uploader', { stationIds: [stationId] })
    const file = freshTone()
    const log = await client.json(
      uploadLog,
      sending(file, start('2026-07-01T06:00'), stationId, 'Morgen ü.wav'),
    )
    expect(log).toMatchObject({
      fileName: 'Morgen ü.wav',
      sizeBytes: file.size,
      format: 'WAV',
      startedAt: '2026-07-01T05:00:00.000Z',
      endedAt: null,
      status: 'queued',
      progress: null,
      failure: null,
      canAnalyseAgain: false,
      detections: 0,
    })
    const stored = await api.dependencies.storage.stat(`logs/${log.id}`)
    expect(stored?.sizeBytes).toBe(file.size)
    const jobs = await api
      .database('jobs')
      .where({ dedupe_key: `analyse-log-${log.id}-1` })
      .select('kind', 'payload', 'status')
    expect(jobs).toEqual([{ kind: 'analyse-log', payload: { logId: log.id }, status: 'waiting' }])
    expect(await auditOf(api.database, log.id)).toMatchObject([{ action: 'upload-log' }])
    const row: unknown = await api.database('station_logs').where({ id: log.id }).first('uploaded_by')
    expect(row).toEqual({ uploaded_by: user.userId })
  })

  it('may carry another extension than its content', async () => {
    const log = await clerk.json(
      uploadLog,
      sending(freshTone(), start('2026-07-01T07:00'), stationId, 'log.mp3'),
    )
    expect(log.format).toBe('WAV')
  })

  it('begins on the side of a change of clocks that was said', async () => {
    const ambiguous = start('2026-10-25T01:30')
    expect(await clerk.problem(uploadLog, sending(freshTone(), ambiguous))).toMatchObject({
      code: 'local-time-invalid',
      status: 422,
      fieldErrors: [{ path: 'occurrence' }],
    })
    const earlier = await clerk.json(uploadLog, sending(freshTone(), { ...ambiguous, occurrence: 'earlier' }))
    const later = await clerk.json(uploadLog, sending(freshTone(), { ...ambiguous, occurrence: 'later' }))
    expect([earlier.startedAt, later.startedAt]).toEqual([
      '2026-10-25T00:30:00.000Z',
      '2026-10-25T01:30:00.000Z',
    ])
  })
})

describe('a log is refused', () => {
  it('when its local time never was, naming the times beside it', async () => {
    const problem = await clerk.problem(uploadLog, sending(freshTone(), start('2026-03-29T01:30')))
    expect(problem).toMatchObject({ code: 'local-time-invalid', fieldErrors: [{ path: 'startedAtLocal' }] })
    expect(problem.detail).toContain('2026-03-29 00:59:59')
    expect(problem.detail).toContain('2026-03-29 02:00:00')
  })

  it('when it begins in the future, or at no time, or in no zone', async () => {
    const future = await clerk.problem(uploadLog, sending(freshTone(), start('2099-01-01T00:00')))
    expect(future).toMatchObject({ status: 422, fieldErrors: [{ path: 'startedAtLocal' }] })
    const nonsense = { startedAtLocal: 'yesterday', timeZone: 'Mars/Olympus' }
    const problem = await clerk.problem(uploadLog, sending(freshTone(), nonsense))
    expect(problem.fieldErrors.map(({ path }) => path).sort()).toEqual(['startedAtLocal', 'timeZone'])
  })

  it.each([
    ['empty', '', 'is empty'],
    ['a text named like audio', 'This is no music.\n', 'is a text'],
    ['a picture', `\u0089PNG\r\n\u001a\n`, 'is not audio'],
    ['noise', '\u0000'.repeat(3000), 'is not audio of a kind that can be read'],
  ])('when it is %s', async (_what, content, words) => {
    const bytes = new Blob([Buffer.from(content, 'latin1')])
    const objects = await storedObjects()
    const problem = await clerk.problem(
      uploadLog,
      sending(bytes, start('2026-07-02T06:00'), stationId, 'log.mp3'),
    )
    expect(problem).toMatchObject({ code: 'file-refused', status: 422, fieldErrors: [{ path: 'file' }] })
    expect(problem.detail).toContain(words)
    expect(await storedObjects()).toBe(objects)
  })

  it('when no file came with it', async () => {
    const form = new FormData()
    for (const [name, value] of Object.entries(start('2026-07-02T06:00'))) form.set(name, value)
    expect(await clerk.problem(uploadLog, { form, params: { stationId } })).toMatchObject({
      fieldErrors: [{ path: 'file' }],
    })
  })

  it('when the station is not theirs, as if there were none', async () => {
    const { client } = await api.signInAs('uploader', { stationIds: [await addStation(api.database)] })
    expect(await client.problem(uploadLog, sending(freshTone(), start('2026-07-02T06:00')))).toMatchObject({
      status: 404,
    })
  })

  it('when its month is not open in the zone of the station', async () => {
    await closeMonth(api.database, '2025-05')
    // 00:30 on 1 June in Athens is still May in Lisbon.
    const fields = { startedAtLocal: '2025-06-01T00:30', timeZone: 'Europe/Athens' }
    const problem = await clerk.problem(uploadLog, sending(freshTone(), fields))
    expect(problem).toMatchObject({ code: 'month-closed', status: 409 })
    expect(problem.detail).toContain('May 2025')
  })

  it('when the same recording is held, naming it to those who may know', async () => {
    const [station, elsewhere] = [await addStation(api.database), await addStation(api.database)]
    const file = freshTone()
    await clerk.json(uploadLog, sending(file, start('2026-07-03T06:00'), station, 'first.wav'))
    const again = await clerk.problem(
      uploadLog,
      sending(file, start('2026-08-03T06:00'), elsewhere, 'second.wav'),
    )
    expect(again).toMatchObject({ code: 'duplicate-log', status: 409 })
    expect(again.detail).toMatch(
      /first\.wav of Station T-\w+ \(T-\w+\), beginning 2026-07-03 06:00:00 Europe\/Lisbon/,
    )
    const { client } = await api.signInAs('uploader', { stationIds: [elsewhere] })
    const hidden = await client.problem(uploadLog, sending(file, start('2026-08-03T06:00'), elsewhere))
    expect(hidden.code).toBe('duplicate-log')
    expect(hidden.detail).not.toContain('first.wav')
  })

  it('when it begins within airtime that is held, beyond two seconds', async () => {
    const station = await addStation(api.database)
    const held = await addLog(api.database, {
      stationId: station,
      startedAt: '2026-07-04T05:00:00Z',
      seconds: 3600,
    })
    const problem = await clerk.problem(
      uploadLog,
      sending(freshTone(), start('2026-07-04T06:59:57'), station),
    )
    expect(problem).toMatchObject({ code: 'overlapping-log', status: 409 })
    expect(problem.detail).toContain(`log-${held}.wav`)
    expect(
      (await clerk.json(uploadLog, sending(freshTone(), start('2026-07-04T06:59:58'), station))).status,
    ).toBe('queued')
    const elsewhere = await addStation(api.database)
    expect(
      (await clerk.json(uploadLog, sending(freshTone(), start('2026-07-04T06:30'), elsewhere))).status,
    ).toBe('queued')
  })

  it('and may come again when the one before was refused', async () => {
    const station = await addStation(api.database)
    const file = freshTone()
    const { id } = await clerk.json(uploadLog, sending(file, start('2026-07-05T06:00'), station))
    await api
      .database('station_logs')
      .where({ id })
      .update({ status: 'rejected', failure_code: 'x', failure_message: 'x' })
    expect((await clerk.json(uploadLog, sending(file, start('2026-07-05T06:00'), station))).status).toBe(
      'queued',
    )
  })
})

describe('the same log sent twice at once', () => {
  it('is taken once, and the file of the other is gone', async () => {
    const [station, elsewhere] = [await addStation(api.database), await addStation(api.database)]
    const file = freshTone()
    const objects = await storedObjects()
    const answers = await Promise.all(
      [station, elsewhere, station, elsewhere].map((target) =>
        clerk.call(uploadLog, sending(file, start('2026-07-06T06:00'), target)),
      ),
    )
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409])
    expect(await storedObjects()).toBe(objects + 1)
    const rows: unknown[] = await api
      .database('station_logs')
      .whereIn('station_id', [station, elsewhere])
      .select('id')
    expect(rows).toHaveLength(1)
  })
})
