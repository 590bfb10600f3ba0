import { jobIdSchema, jobQueues, type JobId, type JobKind } from '@fieldfare/contracts'
import { Queue, type ConnectionOptions } from 'bullmq'
import { z } from 'zod'

export type QueueName = (typeof jobQueues)[JobKind]

/** What travels through Redis: only which row to do. Everything else is read from PostgreSQL. */
export const queuedJobSchema = z.object({ jobId: jobIdSchema })

/** Keys of this product in Redis, so that it can share a server. */
export const QUEUE_PREFIX = 'fieldfare'

export function isJobKind(kind: string): kind is JobKind {
  return Object.hasOwn(jobQueues, kind)
}

export type JobQueue = {
  /** Adding a job that is in the queue already does nothing. */
  add: (kind: JobKind, jobId: JobId) => Promise<void>
  close: () => Promise<void>
}

/**
 * The sending side of the queues. Finished jobs leave Redis at once, failed ones too: their row in PostgreSQL is the
 * record, and their name must be free to be queued again.
 */
export function createJobQueue(connection: ConnectionOptions): JobQueue {
  const open = (name: QueueName) => {
    const queue = new Queue(name, { connection, prefix: QUEUE_PREFIX })
    // The dispatcher reports failed additions; without a listener a lost connection would end the process.
    queue.on('error', () => undefined)
    return queue
  }
  const queues: Record<QueueName, Queue> = { audio: open('audio'), quick: open('quick') }
  return {
    async add(kind, jobId) {
      await queues[jobQueues[kind]].add(
        kind,
        { jobId },
        { jobId: `job-${jobId}`, attempts: 1, removeOnComplete: true, removeOnFail: true },
      )
    },
    async close() {
      await Promise.all(Object.values(queues).map((queue) => queue.close()))
    },
  }
}
