import { randomUUID } from 'node:crypto'
import { mailMessageIdSchema, type JobId, type ServerEvent, serverEventSchema } from '@fieldfare/contracts'
import {
  claimJob,
  completeJob,
  createDatabase,
  createJobDispatcher,
  createJobQueue,
  enqueueJob,
  failJob,
  inTransaction,
  postponeJob,
  publishProgress,
  QUEUE_PREFIX,
  queuedJobSchema,
  reportJobAlive,
  subscribeToProgress,
  type Database,
  type JobDispatcher,
  type JobQueue,
} from '@fieldfare/database'
import { Worker } from 'bullmq'
import { Redis } from 'ioredis'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { createTestDatabase, testRedis, waitUntil } from '../support/index.ts'

let database: Database
let redis: Redis
let queue: JobQueue
let dispatcher: JobDispatcher

beforeAll(async () => {
  database = createDatabase({
    databaseUrl: (await createTestDatabase()).url,
    applicationName: 'fieldfare-test',
  })
  redis = new Redis((await testRedis()).url, { maxRetriesPerRequest: null })
  queue = createJobQueue(redis)
  dispatcher = createJobDispatcher({
    database,
    queue,
    onError: (error) => {
      throw error
    },
    requeueAfterMs: 0,
  })
})

beforeEach(async () => {
  await database('jobs').delete()
  await redis.flushdb()
})

afterAll(async () => {
  await queue.close()
  redis.disconnect()
  await database.destroy()
})

async function enqueue(dedupeKey: string = randomUUID()): Promise<JobId> {
  const payload = { mailMessageId: mailMessageIdSchema.parse(randomUUID()) }
  const { id } = await inTransaction(database, (trx) =>
    enqueueJob(trx, { kind: 'send-mail', payload, dedupeKey }),
  )
  return id
}

async function waitingInRedis(): Promise<number> {
  return redis.llen(`${QUEUE_PREFIX}:quick:wait`)
}

async function statusOf(id: JobId): Promise<string | undefined> {
  const row: { status: string } | undefined = await database('jobs').where({ id }).first('status')
  return row?.status
}

it('dispatches on beside a job of a kind that only a newer version knows', async () => {
  await database('jobs').insert({ kind: 'from-the-future', payload: '{}', dedupe_key: 'from-the-future' })
  const id = await enqueue()
  expect(await dispatcher.dispatch()).toBe(1)
  expect(await waitingInRedis()).toBe(1)
  expect(await statusOf(id)).toBe('waiting')
  expect(await database('jobs').where({ kind: 'from-the-future' }).first('status', 'queued_at')).toEqual({
    status: 'waiting',
    queued_at: null,
  })
})

describe('enqueueJob', () => {
  it('makes one job however often it is asked', async () => {
    const [first, second] = await Promise.all([enqueue('the-same'), enqueue('the-same')])
    expect(first).toBe(second)
    expect(await database('jobs')).toHaveLength(1)
  })

  it('makes none when the transaction around it fails', async () => {
    const failing = inTransaction(database, async (trx) => {
      const payload = { mailMessageId: mailMessageIdSchema.parse(randomUUID()) }
      await enqueueJob(trx, { kind: 'send-mail', payload, dedupeKey: 'never' })
      throw new Error('no')
    })
    await expect(failing).rejects.toThrow('no')
    expect(await dispatcher.dispatch()).toBe(0)
  })
})

describe('the dispatcher', () => {
  it('queues a job once, however many rounds and dispatchers run', async () => {
    await enqueue()
    await Promise.all([dispatcher.dispatch(), dispatcher.dispatch()])
    await dispatcher.dispatch()
    expect(await waitingInRedis()).toBe(1)
  })

  it('queues again what Redis lost', async () => {
    await enqueue()
    await dispatcher.dispatch()
    await redis.flushdb()
    await dispatcher.dispatch()
    expect(await waitingInRedis()).toBe(1)
  })

  it('leaves jobs alone until they are due', async () => {
    const id = await enqueue()
    await database('jobs')
      .where({ id })
      .update({ run_after: new Date(Date.now() + 60_000) })
    expect(await dispatcher.dispatch()).toBe(0)
  })

  it('frees the job of a worker that fell silent', async () => {
    const id = await enqueue()
    await claimJob(database, id, 'worker-1')
    await database('jobs')
      .where({ id })
      .update({ heartbeat_at: new Date(Date.now() - 60_000) })
    await dispatcher.dispatch()
    expect(await statusOf(id)).toBe('waiting')
    expect(await reportJobAlive(database, id, 'worker-1')).toBe(false)
    expect(await completeJob(database, id, 'worker-1')).toBe(false)
    expect(await claimJob(database, id, 'worker-2')).toMatchObject({ id, attempts: 2 })
  })

  it('brings jobs to a worker', async () => {
    const done: JobId[] = []
    const worker = new Worker(
      'quick',
      async (queued) => {
        const { jobId } = queuedJobSchema.parse(queued.data)
        const job = await claimJob(database, jobId, 'worker-1')
        if (job !== null && (await completeJob(database, job.id, 'worker-1'))) done.push(job.id)
      },
      { connection: redis, prefix: QUEUE_PREFIX },
    )
    const ids = [await enqueue(), await enqueue(), await enqueue()]
    dispatcher.start()
    await waitUntil(() => done.length === ids.length)
    await dispatcher.stop()
    await worker.close()
    expect(done.toSorted()).toEqual(ids.toSorted())
  })
})

describe('a job', () => {
  it('is claimed by one worker only', async () => {
    const id = await enqueue()
    const claims = await Promise.all([1, 2, 3].map((worker) => claimJob(database, id, `worker-${worker}`)))
    expect(claims.filter((claim) => claim !== null)).toHaveLength(1)
  })

  it('that is done or failed is never claimed again', async () => {
    const [done, failed] = [await enqueue(), await enqueue()]
    await claimJob(database, done, 'w')
    await completeJob(database, done, 'w')
    await claimJob(database, failed, 'w')
    await failJob(database, failed, 'w', 'The mail server refused the address.')
    expect(await claimJob(database, done, 'w')).toBeNull()
    expect(await claimJob(database, failed, 'w')).toBeNull()
    expect([await statusOf(done), await statusOf(failed)]).toEqual(['done', 'failed'])
  })

  it('that is postponed waits for its time', async () => {
    const id = await enqueue()
    await claimJob(database, id, 'w')
    await postponeJob(database, id, 'w', { message: 'The mail server is away.', delayMs: 60_000 })
    expect(await claimJob(database, id, 'w')).toBeNull()
    await database('jobs').where({ id }).update({ run_after: new Date() })
    expect(await claimJob(database, id, 'w')).toMatchObject({ attempts: 2 })
  })
})

describe('progress', () => {
  it('reaches those who listen, and nothing that is not progress does', async () => {
    const heard: ServerEvent[] = []
    const subscription = await subscribeToProgress(redis, (event) => heard.push(event))
    const event = serverEventSchema.parse({
      kind: 'distribution-progress',
      month: '2026-11',
      status: 'open',
      done: 1,
      total: 2,
    })
    await redis.publish('fieldfare:progress', 'not JSON')
    await redis.publish('fieldfare:progress', '{"kind":"gossip"}')
    await publishProgress(redis, event)
    await waitUntil(() => heard.length > 0)
    await subscription.close()
    expect(heard).toEqual([event])
  })
})
