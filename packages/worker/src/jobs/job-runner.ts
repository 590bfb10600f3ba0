import type { JobId, JobKind } from '@fieldfare/contracts'
import {
  claimJob,
  completeJob,
  failJob,
  handBackJob,
  inTransaction,
  isJobKind,
  JOB_SILENCE_MS,
  postponeJob,
  publishProgress,
  reportJobAlive,
  type ClaimedJob,
} from '@fieldfare/database'
import {
  JobRefused,
  JobTakenAway,
  type JobContext,
  type Retries,
  type RunnableJob,
  type WorkerServices,
} from './job-context.ts'

export type JobHandlers = Readonly<Record<JobKind, RunnableJob>>

const MOST_CRASHES = 2
const HEARTBEAT_MS = JOB_SILENCE_MS / 5

type RunnerOptions = { services: WorkerServices; handlers: JobHandlers; workerName: string }

/** Reports that the job is alive until stopped; aborts the signal when it was taken away. */
function keepAlive({ services, workerName }: RunnerOptions, id: JobId, controller: AbortController) {
  let isReporting = false
  const timer = setInterval(() => {
    // While results are written the row is locked and a report waits; more of them would only hold connections.
    if (isReporting) return
    isReporting = true
    reportJobAlive(services.database, id, workerName)
      .then(
        (isOurs) => {
          if (!isOurs) controller.abort(new JobTakenAway(`job ${id} was taken away`))
        },
        (error: unknown) => services.logger.warn({ error, jobId: id }, 'heartbeat failed'),
      )
      .finally(() => {
        isReporting = false
      })
  }, HEARTBEAT_MS)
  return () => clearInterval(timer)
}

function contextFor({ services, workerName }: RunnerOptions, id: JobId, signal: AbortSignal): JobContext {
  return {
    ...services,
    signal,
    tell: (event) => publishProgress(services.redis, event),
    finish: (write) =>
      inTransaction(services.database, async (trx) => {
        // Claiming the end first takes the row's lock: a job that was taken away writes nothing.
        if (!(await completeJob(trx, id, workerName))) throw new JobTakenAway(`job ${id} was taken away`)
        await write(trx)
      }),
  }
}

async function runClaimed(
  options: RunnerOptions,
  handler: RunnableJob,
  job: ClaimedJob,
  signal: AbortSignal,
): Promise<void> {
  const fail = (reason: string) =>
    inTransaction(options.services.database, async (trx) => {
      if (await failJob(trx, job.id, options.workerName, reason))
        await handler.onFailure(trx, job.payload, reason)
    })
  // A job during which the process died again and again would take every worker down.
  if (job.attempts > handler.retries.attempts + MOST_CRASHES) {
    await fail('The worker ended while doing this, again and again.')
    return
  }
  try {
    await handler.run(contextFor(options, job.id, signal), job.payload)
  } catch (error) {
    // What breaks off once the job was taken away is another's to settle, even if that other is this very worker.
    const cause: unknown = signal.reason instanceof JobTakenAway ? signal.reason : error
    await settleFailure(options, job, cause, { fail, retries: handler.retries, isStopping: signal.aborted })
  }
}

async function settleFailure(
  { services, workerName }: RunnerOptions,
  job: ClaimedJob,
  error: unknown,
  {
    fail,
    retries,
    isStopping,
  }: { fail: (reason: string) => Promise<void>; retries: Retries; isStopping: boolean },
): Promise<void> {
  const { database, logger } = services
  const about = { jobId: job.id, kind: job.kind, attempts: job.attempts }
  if (error instanceof JobTakenAway) {
    logger.warn(about, 'job was taken away')
    return
  }
  if (error instanceof JobRefused) {
    logger.info({ ...about, reason: error.message }, 'job cannot succeed')
    await fail(error.message)
    return
  }
  if (isStopping) {
    await handBackJob(database, job.id, workerName)
    return
  }
  logger.error({ ...about, error }, 'job broke off')
  if (job.attempts >= retries.attempts) {
    await fail(`It broke off ${job.attempts} times. The log of the worker has the details.`)
    return
  }
  const message = error instanceof Error ? error.message : String(error)
  await postponeJob(database, job.id, workerName, { message, delayMs: retries.pauseMs(job.attempts) })
}

/**
 * Does one job by its row's id: claims it, keeps it alive, runs its handler, settles failures. Doing a job that is
 * done, or that another worker does, is nothing.
 */
export async function runJob(options: RunnerOptions, id: JobId, stopSignal: AbortSignal): Promise<void> {
  const job = await claimJob(options.services.database, id, options.workerName)
  if (job === null) return
  if (!isJobKind(job.kind)) throw new Error(`No handler for jobs of kind ${job.kind}`)
  const controller = new AbortController()
  const stop = keepAlive(options, id, controller)
  try {
    await runClaimed(
      options,
      options.handlers[job.kind],
      job,
      AbortSignal.any([controller.signal, stopSignal]),
    )
  } finally {
    stop()
  }
}
