import { randomBytes, randomUUID } from 'node:crypto'
import {
  distributionIdSchema,
  mailMessageIdSchema,
  referenceAudioIdSchema,
  type JobId,
  type RecordingId,
  type StationId,
  type StationLogId,
} from '@fieldfare/contracts'
import {
  claimJob,
  completeJob,
  configurationSchema,
  createDatabase,
  enqueueJob,
  handBackJob,
  inTransaction,
  insertPlaysForAccepted,
  JOB_SILENCE_MS,
  listFingerprintsAfter,
  lockDistributionRun,
  markLogUnusable,
  releaseSilentJobs,
  saveFingerprint,
  sendMail,
  type Database,
  type ReferenceToFingerprint,
} from '@fieldfare/database'
import { startWorker } from '@fieldfare/worker'
import { pino } from 'pino'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestDatabase, temporaryDirectory, testRedis, waitUntil } from '../support/index.ts'
import { addDetection, addLog, addRecording, addStation } from './feature-data.ts'

/** What the worker relies on where several workers, logs and references meet. */
let database: Database
let databaseUrl: string
let userId: string

beforeAll(async () => {
  databaseUrl = (await createTestDatabase()).url
  database = createDatabase({ databaseUrl, applicationName: 'fieldfare-test' })
  const users: { id: string }[] = await database('users')
    .insert({
      email: 'clerk@example.org',
      name: 'Clerk',
      role: 'clerk',
      status: 'active',
      password_hash: 'x',
    })
    .returning('id')
  userId = users[0]?.id ?? ''
})
afterAll(() => database.destroy())

async function enqueue(): Promise<JobId> {
  const payload = { mailMessageId: mailMessageIdSchema.parse(randomUUID()) }
  const { id } = await inTransaction(database, (trx) =>
    enqueueJob(trx, { kind: 'send-mail', payload, dedupeKey: randomUUID() }),
  )
  return id
}

describe('a tune that runs from one log into the next, while both recorders run', () => {
  const FIRST = '2026-11-03T10:00:00.000Z'
  const SECOND = '2026-11-03T10:59:59.000Z'
  let stationId: StationId
  let recordingId: RecordingId

  const playsOf = () =>
    database('plays')
      .where({ recording_id: recordingId })
      .orderBy('started_at')
      .select<{ startedAt: string; endedAt: string }[]>({ startedAt: 'started_at', endedAt: 'ended_at' })

  beforeAll(async () => {
    stationId = await addStation(database)
    recordingId = await addRecording(database)
  })

  it('counts in both, and the second they share counts once', async () => {
    const first = await addLog(database, { stationId, startedAt: FIRST, seconds: 3600 })
    // The second log began a second before the first ended; that second belongs to the first.
    const second = await addLog(database, { stationId, startedAt: '2026-11-03T11:00:00.000Z', seconds: 3599 })
    const found = { stationId, recordingId }
    await addDetection(
      database,
      { ...found, logId: first, logStartedAt: FIRST, from: 3480, to: 3600 },
      'accept',
    )
    await addDetection(database, { ...found, logId: second, logStartedAt: SECOND, from: 0, to: 91 }, 'accept')
    const airtimes = [
      { logId: first, from: new Date(FIRST), to: new Date('2026-11-03T11:00:00.000Z') },
      {
        logId: second,
        from: new Date('2026-11-03T11:00:00.000Z'),
        to: new Date('2026-11-03T11:59:59.000Z'),
      },
    ]
    for (const { logId, ...airtime } of airtimes)
      await inTransaction(database, (trx) => insertPlaysForAccepted(trx, logId, airtime))
    expect(await playsOf()).toEqual([
      { startedAt: '2026-11-03T10:58:00.000Z', endedAt: '2026-11-03T11:00:00.000Z' },
      { startedAt: '2026-11-03T11:00:00.000Z', endedAt: '2026-11-03T11:01:30.000Z' },
    ])
  })
})

describe('a log whose audio can no longer be used', () => {
  const outcome = { status: 'rejected', code: 'unrecognised-format', message: 'This is not audio.' } as const
  const refused = async (logId: StationLogId) => {
    await inTransaction(database, (trx) => markLogUnusable(trx, logId, outcome))
    return database('station_logs')
      .where({ id: logId })
      .first<{ status: string; isHeld: boolean }>('status', database.raw('airtime is not null as "isHeld"'))
  }

  it('stays held when it was analysed before, since its plays still count', async () => {
    const log = { stationId: await addStation(database), startedAt: '2026-11-05T10:00:00.000Z', seconds: 60 }
    expect(await refused(await addLog(database, log))).toEqual({ status: 'failed', isHeld: true })
  })

  it('is refused when nothing was ever made of it', async () => {
    const log = { stationId: await addStation(database), startedAt: '2026-11-05T10:00:00.000Z', seconds: 60 }
    const id = await addLog(database, { ...log, status: 'analysing' })
    await database('station_logs').where({ id }).update({ analysed_at: null })
    expect(await refused(id)).toEqual({ status: 'rejected', isHeld: false })
  })
})

describe('fingerprints that are stored at the same moment', () => {
  async function addReference(): Promise<ReferenceToFingerprint> {
    const recordingId = await addRecording(database)
    const id = referenceAudioIdSchema.parse(randomUUID())
    const reference = { id, recordingId, storageKey: `reference-audio/${id}`, fileName: 'tune.wav' }
    await database('reference_audio').insert({
      id,
      recording_id: recordingId,
      file_name: reference.fileName,
      size_bytes: 1,
      sha256: randomBytes(32),
      storage_key: reference.storageKey,
      uploaded_by: userId,
    })
    return reference
  }
  const fingerprintOf = (reference: ReferenceToFingerprint) => ({
    reference,
    engineVersion: 'test',
    landmarks: new Uint8Array([1]),
    landmarkHashes: 1,
    format: 'WAV',
    durationMs: 1000,
  })

  it('are all seen by a worker that asks for what is new, in whatever order they commit', async () => {
    const [slow, quick] = [await addReference(), await addReference()]
    const seen: bigint[] = []
    const askForNew = async () => {
      const rows = await listFingerprintsAfter(database, 'test', seen.at(-1) ?? 0n, 100)
      seen.push(...rows.map(({ sequence }) => sequence))
    }
    let release = (): void => undefined
    const released = new Promise<void>((resolve) => (release = resolve))
    let slowIsWritten = (): void => undefined
    const written = new Promise<void>((resolve) => (slowIsWritten = resolve))
    const slowSave = inTransaction(database, async (trx) => {
      await saveFingerprint(trx, fingerprintOf(slow))
      slowIsWritten()
      await released
    })
    await written
    const quickSave = inTransaction(database, (trx) => saveFingerprint(trx, fingerprintOf(quick)))
    // The quick one is done first, or waits for the slow one.
    await Promise.race([quickSave, untilSomebodyWaits()])
    await askForNew()
    release()
    await Promise.all([slowSave, quickSave])
    await askForNew()
    expect(seen).toHaveLength(2)
  })

  async function untilSomebodyWaits(): Promise<void> {
    for (;;) {
      const waiting: unknown[] = await database('pg_locks').where({ granted: false }).select('pid')
      if (waiting.length > 0) return
    }
  }
})

describe('mail', () => {
  it('is not given up because the mail server is away for a minute', async () => {
    const mailId = await inTransaction(database, (trx) =>
      sendMail(trx, { to: 'somebody@example.org', subject: 'Statement', text: 'It has been issued.' }),
    )
    const row = () =>
      database('jobs')
        .where({ dedupe_key: `send-mail-${mailId}` })
        .first<{ status: string; attempts: number; isPaused: boolean }>(
          'status',
          'attempts',
          database.raw(`run_after > now() + interval '1 minute' as "isPaused"`),
        )
    await database('jobs')
      .where({ dedupe_key: `send-mail-${mailId}` })
      .update({ attempts: 4 })
    const configuration = configurationSchema.parse({
      FIELDFARE_MODE: 'test',
      FIELDFARE_DATABASE_URL: databaseUrl,
      FIELDFARE_REDIS_URL: (await testRedis()).url,
      FIELDFARE_STORAGE_DIR: await temporaryDirectory('storage'),
      FIELDFARE_TOKEN_SECRET: 'a secret that only the tests of this product know',
      FIELDFARE_WORKER_THREADS: '1',
      FIELDFARE_MAIL: 'smtp',
      // Nothing listens on the first port.
      FIELDFARE_SMTP_URL: 'smtp://127.0.0.1:1',
    })
    const worker = await startWorker(configuration, pino({ level: 'silent' }))
    try {
      const settled = await waitUntil(
        async () => {
          const job = await row()
          return job.status === 'failed' || job.attempts === 5 ? job : null
        },
        { timeoutMs: 20_000, description: 'one try of the mail' },
      )
      expect(settled.attempts).toBe(5)
      const after = await waitUntil(
        async () => {
          const job = await row()
          return job.status === 'running' ? null : job
        },
        { timeoutMs: 20_000, description: 'the try settled' },
      )
      expect(after).toEqual({ status: 'waiting', attempts: 5, isPaused: true })
    } finally {
      await worker.stop()
    }
  })
})

describe('a run whose statements were asked for', () => {
  it('knows since when', async () => {
    const month = '2031-01-01'
    await database('distribution_months').insert({ month, status: 'calculating' })
    const rows: { id: string }[] = await database('distributions')
      .insert({
        month,
        run: 1,
        rules_version: '1',
        currency: 'EUR',
        currency_digits: 2,
        requested_by: userId,
      })
      .returning('id')
    const distributionId = distributionIdSchema.parse(rows[0]?.id)
    const requestedAt = () =>
      inTransaction(
        database,
        async (trx) => (await lockDistributionRun(trx, distributionId))?.issueRequestedAt,
      )
    expect(await requestedAt()).toBeNull()
    await inTransaction(database, (trx) =>
      enqueueJob(trx, {
        kind: 'render-statements',
        payload: { distributionId },
        dedupeKey: `render-statements-${distributionId}`,
      }),
    )
    expect(await requestedAt()).toMatch(/^\d{4}-/)
  })
})

describe('a job', () => {
  it('that a stopping worker hands back is free at once, and the try does not count', async () => {
    const id = await enqueue()
    for (const worker of ['first', 'second', 'third']) {
      expect(await claimJob(database, id, worker)).toMatchObject({ attempts: 1 })
      expect(await handBackJob(database, id, worker)).toBe(true)
    }
    expect(await handBackJob(database, id, 'third')).toBe(false)
  })

  it('whose long result is being written does not hold up the others', async () => {
    const [busy, silent] = [await enqueue(), await enqueue()]
    await claimJob(database, busy, 'busy')
    await claimJob(database, silent, 'dead')
    await database('jobs')
      .whereIn('id', [busy, silent])
      .update({ heartbeat_at: new Date(Date.now() - 2 * JOB_SILENCE_MS) })
    await inTransaction(database, async (trx) => {
      expect(await completeJob(trx, busy, 'busy')).toBe(true)
      expect(await releaseSilentJobs(database)).toBe(1)
    })
    const statuses = await database('jobs')
      .whereIn('id', [busy, silent])
      .select<{ id: string; status: string }[]>('id', 'status')
    expect(new Map(statuses.map((row) => [row.id, row.status]))).toEqual(
      new Map([
        [busy, 'done'],
        [silent, 'waiting'],
      ]),
    )
  })
})
