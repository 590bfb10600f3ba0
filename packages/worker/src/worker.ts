import {
  beatWorker,
  createDatabase,
  createJobDispatcher,
  createJobQueue,
  createStorage,
  enqueueMissingFingerprints,
  inTransaction,
  QUEUE_PREFIX,
  queuedJobSchema,
  removeWorker,
  type Configuration,
  type QueueName,
} from '@fieldfare/database'
import { ENGINE_VERSION } from '@fieldfare/fingerprint'
import { Worker as QueueWorker } from 'bullmq'
import { Redis } from 'ioredis'
import { randomUUID } from 'node:crypto'
import { hostname } from 'node:os'
import type { Logger } from 'pino'
import { createReferenceCatalogue } from './engine/reference-catalogue.ts'
import { createThreadPool } from './engine/thread-pool.ts'
import { jobHandlers } from './job-handlers.ts'
import type { WorkerServices } from './jobs/job-context.ts'
import { runJob } from './jobs/job-runner.ts'
import { createMailTransport } from './mail/mail-transport.ts'

const QUICK_JOBS_AT_ONCE = 4
const HEARTBEAT_MS = 5000

export type RunningWorker = { name: string; stop: () => Promise<void> }

function openServices(configuration: Configuration, logger: Logger): WorkerServices {
  const database = createDatabase({
    databaseUrl: configuration.databaseUrl,
    applicationName: 'fieldfare-worker',
  })
  const redis = new Redis(configuration.redisUrl, { maxRetriesPerRequest: null })
  redis.on('error', (error) => logger.warn({ error }, 'redis'))
  const threads = createThreadPool(configuration.workerThreads)
  return {
    configuration,
    database,
    redis,
    storage: createStorage(configuration.storage),
    threads,
    catalogue: createReferenceCatalogue(database, threads),
    mail: createMailTransport(configuration.mail),
    logger,
  }
}

function startHeartbeat({ database, catalogue, logger }: WorkerServices, name: string): () => void {
  const beat = () => {
    beatWorker(database, {
      name,
      indexRecordings: catalogue.recordingCount,
      indexBytes: catalogue.byteLength,
    }).catch((error: unknown) => logger.warn({ error }, 'heartbeat failed'))
  }
  beat()
  const timer = setInterval(beat, HEARTBEAT_MS)
  return () => clearInterval(timer)
}

/** Starts a worker: it takes jobs until stopped. Any number may run, on any machine that reaches the services. */
export async function startWorker(configuration: Configuration, logger: Logger): Promise<RunningWorker> {
  const services = openServices(configuration, logger)
  const { database, redis, threads } = services
  const name = `${hostname()}-${randomUUID().slice(0, 8)}`
  const stopping = new AbortController()
  const run = { services, handlers: jobHandlers, workerName: name }
  const consume = (queue: QueueName, concurrency: number) => {
    const worker = new QueueWorker(
      queue,
      async (job) => runJob(run, queuedJobSchema.parse(job.data).jobId, stopping.signal),
      { connection: redis.duplicate(), prefix: QUEUE_PREFIX, concurrency, lockDuration: 60_000 },
    )
    worker.on('error', (error) => logger.warn({ error, queue }, 'queue'))
    return worker
  }
  await inTransaction(database, (trx) => enqueueMissingFingerprints(trx, ENGINE_VERSION))
  const consumers = [consume('audio', configuration.workerThreads), consume('quick', QUICK_JOBS_AT_ONCE)]
  const queue = createJobQueue(redis.duplicate())
  const dispatcher = createJobDispatcher({
    database,
    queue,
    onError: (error) => logger.warn({ error }, 'dispatcher'),
  })
  dispatcher.start()
  // Loaded before the first log asks for it; should it fail, that log tries again.
  services.catalogue.refresh().catch((error: unknown) => logger.warn({ error }, 'catalogue not loaded yet'))
  const stopHeartbeat = startHeartbeat(services, name)
  logger.info({ name, threads: configuration.workerThreads }, 'worker started')
  return {
    name,
    async stop() {
      stopHeartbeat()
      await dispatcher.stop()
      stopping.abort()
      await Promise.all(consumers.map((consumer) => consumer.close()))
      await queue.close()
      await threads.close()
      services.mail.close()
      services.storage.close()
      await removeWorker(database, name)
      redis.disconnect()
      await database.destroy()
    },
  }
}
