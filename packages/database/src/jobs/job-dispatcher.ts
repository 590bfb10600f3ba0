import type { Database } from '../connection.ts'
import { inTransaction } from '../transaction.ts'
import { isJobKind, type JobQueue } from './job-queue.ts'
import { releaseSilentJobs, takeJobsToQueue } from './job.repository.ts'

export type JobDispatcherOptions = {
  database: Database
  queue: JobQueue
  /** Told about every round that failed; the next round tries again. */
  onError: (error: unknown) => void
  pollMs?: number
  /** Jobs that were queued this long ago and still wait are queued again, in case Redis lost them. */
  requeueAfterMs?: number
  batchSize?: number
}

export type JobDispatcher = {
  /** One round: rows that wait go to the queue. Returns how many did. */
  dispatch: () => Promise<number>
  start: () => void
  /** Resolves when the round under way has ended. */
  stop: () => Promise<void>
}

/**
 * Carries jobs from PostgreSQL to Redis, again and again, so that nothing depends on Redis keeping them.
 * Any number of dispatchers may run.
 */
export function createJobDispatcher(options: JobDispatcherOptions): JobDispatcher {
  const { database, queue, pollMs = 300, requeueAfterMs = 10_000, batchSize = 100 } = options
  let timer: NodeJS.Timeout | null = null
  let isStopped = true
  let round: Promise<void> = Promise.resolve()

  async function dispatch(): Promise<number> {
    await releaseSilentJobs(database)
    // Redis is asked inside the transaction: should it refuse, the rows stay as they were.
    return inTransaction(database, async (trx) => {
      const jobs = await takeJobsToQueue(trx, { count: batchSize, requeueAfterMs })
      for (const job of jobs) {
        if (!isJobKind(job.kind)) throw new Error(`No queue takes jobs of kind ${job.kind}`)
        await queue.add(job.kind, job.id)
      }
      return jobs.length
    })
  }

  function schedule(delayMs: number): void {
    if (isStopped) return
    timer = setTimeout(() => {
      round = dispatch().then(
        (count) => schedule(count === batchSize ? 0 : pollMs),
        (error: unknown) => {
          options.onError(error)
          schedule(pollMs)
        },
      )
    }, delayMs)
  }

  return {
    dispatch,
    start() {
      if (!isStopped) return
      isStopped = false
      schedule(0)
    },
    async stop() {
      isStopped = true
      if (timer !== null) clearTimeout(timer)
      await round
    },
  }
}
