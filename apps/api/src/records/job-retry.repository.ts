import type { JobId, JobKind } from '@fieldfare/contracts'
import { enqueueJob, type Database, type NewJob, type Transaction } from '@fieldfare/database'

export type JobOutcome = { status: 'waiting' | 'running' | 'done' | 'failed'; errorMessage: string | null }

/**
 * Asks for work whose result is missing. One job stands for it however many ask; one that has ended already, well or
 * badly, runs again, since what it was to make is not there.
 */
export async function askAgain<Kind extends JobKind>(trx: Transaction, job: NewJob<Kind>): Promise<JobId> {
  const { id, isNew } = await enqueueJob(trx, job)
  if (!isNew) {
    await trx('jobs').where({ id }).whereIn('status', ['done', 'failed']).update({
      status: 'waiting',
      attempts: 0,
      queued_at: null,
      run_after: trx.fn.now(),
      started_at: null,
      finished_at: null,
      heartbeat_at: null,
      worker_name: null,
      error_message: null,
    })
  }
  return id
}

export async function readJobOutcome(database: Database, id: JobId): Promise<JobOutcome | null> {
  const row: JobOutcome | undefined = await database('jobs')
    .where({ id })
    .first('status', { errorMessage: 'error_message' })
  return row ?? null
}
