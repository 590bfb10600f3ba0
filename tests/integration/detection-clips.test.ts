import { Readable } from 'node:stream'
import { getDetectionClip, jobIdSchema } from '@fieldfare/contracts'
import { claimJob, completeJob, failJob } from '@fieldfare/database'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildRecording } from '../factories/build-catalogue.ts'
import { buildDetection, type BuiltDetection } from '../factories/build-detection.ts'
import { buildLog } from '../factories/build-log.ts'
import { buildStation } from '../factories/build-station.ts'
import { waitUntil } from '../support/index.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

let api: TestApi
let clerk: SignedInClient
let detection: BuiltDetection
let silent: BuiltDetection

const WORKER = 'test-worker'

beforeAll(async () => {
  api = await startTestApi()
  const { database } = api
  const station = await buildStation(database)
  const recording = await buildRecording(database)
  const kept = await buildLog(database, { station, startedAt: '2026-10-05T10:00:00Z' })
  const expired = await buildLog(database, {
    station,
    startedAt: '2026-10-06T10:00:00Z',
    isAudioKept: false,
  })
  detection = await buildDetection(database, {
    station,
    recording,
    logId: kept,
    startedAt: '2026-10-05T10:05:00Z',
  })
  silent = await buildDetection(database, {
    station,
    recording,
    logId: expired,
    startedAt: '2026-10-06T10:05:00Z',
  })
  clerk = await api.signInAs('clerk')
})

const clip = (source: string, fromSeconds: number, of = detection) => ({
  params: { detectionId: of.id, source },
  query: { fromSeconds: String(fromSeconds) },
})

async function store(key: string, text: string): Promise<void> {
  await api.dependencies.storage.put(key, { stream: Readable.from([Buffer.from(text)]) })
}

/** Takes the job of a clip as a worker would, once it is asked for. */
async function claimClipJob(name: string) {
  return waitUntil(
    async () => {
      const row: { id: string } | undefined = await api
        .database('jobs')
        .where({ dedupe_key: `cut-clip-${name}`, status: 'waiting' })
        .first('id')
      return row === undefined ? null : claimJob(api.database, jobIdSchema.parse(row.id), WORKER)
    },
    { description: 'the job of the clip' },
  )
}

describe('a clip', () => {
  it('that is there is sent, whole or a range of it', async () => {
    await store(`clips/${detection.id}-log-30.mp3`, 'clip of the log')
    const whole = await clerk.client.call(getDetectionClip, clip('log', 30))
    expect(whole).toMatchObject({ status: 200, text: 'clip of the log' })
    expect(whole.headers.get('content-type')).toBe('audio/mpeg')
    expect(whole.headers.get('accept-ranges')).toBe('bytes')
    const part = await clerk.client.call(getDetectionClip, {
      ...clip('log', 30),
      headers: { range: 'bytes=5-6' },
    })
    expect(part).toMatchObject({ status: 206, text: 'of' })
    expect(part.headers.get('content-range')).toBe('bytes 5-6/15')
  })

  it('that is not there is cut by one job, however many ask, and then sent', async () => {
    const name = `${detection.id}-log-60.mp3`
    const answers = Promise.all([1, 2].map(() => clerk.client.call(getDetectionClip, clip('log', 60))))
    const job = await claimClipJob(name)
    expect(job.payload).toEqual({ detectionId: detection.id, source: 'log', fromSeconds: 60 })
    await store(`clips/${name}`, 'freshly cut')
    await completeJob(api.database, job.id, WORKER)
    for (const answer of await answers) expect(answer).toMatchObject({ status: 200, text: 'freshly cut' })
    const jobs: unknown[] = await api.database('jobs').where({ dedupe_key: `cut-clip-${name}` })
    expect(jobs).toHaveLength(1)
  })

  it('that could not be cut says why, and is tried again when asked for again', async () => {
    const name = `${detection.id}-log-90.mp3`
    const first = clerk.client.problem(getDetectionClip, clip('log', 90))
    const failing = await claimClipJob(name)
    await failJob(api.database, failing.id, WORKER, 'The log file is damaged.')
    expect(await first).toMatchObject({
      status: 503,
      detail: 'The clip could not be made. The log file is damaged.',
    })
    const second = clerk.client.call(getDetectionClip, clip('log', 90))
    const job = await claimClipJob(name)
    await store(`clips/${name}`, 'cut at last')
    await completeJob(api.database, job.id, WORKER)
    expect(await second).toMatchObject({ status: 200, text: 'cut at last' })
  })

  it('of audio that is no longer kept is gone, unless it was cut before', async () => {
    expect(await clerk.client.problem(getDetectionClip, clip('log', 0, silent))).toMatchObject({
      status: 410,
      code: 'audio-expired',
    })
    expect(await clerk.client.problem(getDetectionClip, clip('reference', 0))).toMatchObject({
      code: 'audio-expired',
    })
    await store(`clips/${silent.id}-log-1.mp3`, 'kept as evidence')
    expect(await clerk.client.call(getDetectionClip, clip('log', 1, silent))).toMatchObject({ status: 200 })
  })

  it('cannot begin after the detection, and asks for no work then', async () => {
    const problem = await clerk.client.problem(getDetectionClip, clip('log', 180))
    expect(problem.fieldErrors.map(({ path }) => path)).toEqual(['fromSeconds'])
    const jobs: unknown[] = await api.database('jobs').whereLike('dedupe_key', '%-log-180.mp3')
    expect(jobs).toEqual([])
  })

  it('of another station is not open to an uploader', async () => {
    const { client } = await api.signInAs('uploader')
    expect((await client.problem(getDetectionClip, clip('log', 30))).code).toBe('not-found')
  })
})
