import {
  jobIdSchema,
  jobPayloadSchemas,
  type JobId,
  type JobKind,
  type JobPayload,
} from '@fieldfare/contracts'
import type { Connection, Database, Transaction } from '../connection.ts'

/** A request for work. The dedupe key says what the work is, so that asking twice makes one job. */
export type NewJob<Kind extends JobKind> = {
  kind: Kind
  payload: JobPayload<Kind>
  dedupeKey: string
  /** Not before this moment. */
  runAfter?: Date
}

/** A job a worker has taken and must now do. */
export type ClaimedJob = { id: JobId; kind: string; payload: unknown; attempts: number }

/** How long a running job may stay silent before it counts as lost; workers report every few seconds. */
export const JOB_SILENCE_MS = 30_000

/**
 * Asks for work in the caller's transaction, so that the job exists exactly when what it is about does.
 * Where the dedupe key is known already nothing is added and the job held is named, whatever became of it.
 */
export async function enqueueJob<Kind extends JobKind>(
  trx: Transaction,
  job: NewJob<Kind>,
): Promise<{ id: JobId; isNew: boolean }> {
  const payload: unknown = jobPayloadSchemas[job.kind].parse(job.payload)
  const inserted: { id: string }[] = await trx('jobs')
    .insert({
      kind: job.kind,
      payload: JSON.stringify(payload),
      dedupe_key: job.dedupeKey,
      ...(job.runAfter === undefined ? {} : { run_after: job.runAfter }),
    })
    .onConflict('dedupe_key')
    .ignore()
    .returning('id')
  const [added] = inserted
  if (added !== undefined) return { id: jobIdSchema.parse(added.id), isNew: true }
  const held: { id: string } | undefined = await trx('jobs').where({ dedupe_key: job.dedupeKey }).first('id')
  return { id: jobIdSchema.parse(held?.id), isNew: false }
}

/**
 * Marks the job as running and returns it, or null when there is nothing to do: it is done, failed, not yet due,
 * or another worker has it and still reports.
 */
export async function claimJob(
  database: Database,
  id: JobId,
  workerName: string,
): Promise<ClaimedJob | null> {
  const claimed: { id: string; kind: string; payload: unknown; attempts: number }[] = await database('jobs')
    .where({ id })
    .andWhere((free) =>
      free
        .where((waiting) => waiting.where({ status: 'waiting' }).whereRaw('run_after <= now()'))
        .orWhere((silent) =>
          silent
            .where({ status: 'running' })
            .whereRaw("heartbeat_at < now() - ? * interval '1 millisecond'", [JOB_SILENCE_MS]),
        ),
    )
    .update({
      status: 'running',
      worker_name: workerName,
      attempts: database.raw('attempts + 1'),
      started_at: database.fn.now(),
      heartbeat_at: database.fn.now(),
      error_message: null,
    })
    .returning(['id', 'kind', 'payload', 'attempts'])
  const [job] = claimed
  return job === undefined ? null : { ...job, id: jobIdSchema.parse(job.id) }
}

/** Says the job is still being done. False when it was taken away meanwhile: then stop without writing. */
export async function reportJobAlive(database: Database, id: JobId, workerName: string): Promise<boolean> {
  const updated = await database('jobs')
    .where({ id, status: 'running', worker_name: workerName })
    .update({ heartbeat_at: database.fn.now() })
  return updated === 1
}

/** Ends the job well; call it in the transaction that writes its last result. False when it is no longer this worker's. */
export async function completeJob(connection: Connection, id: JobId, workerName: string): Promise<boolean> {
  const updated = await connection('jobs')
    .where({ id, status: 'running', worker_name: workerName })
    .update({ status: 'done', finished_at: connection.fn.now(), error_message: null })
  return updated === 1
}

/** Ends the job badly. The message is in words for people: it is shown as the reason. */
export async function failJob(
  connection: Connection,
  id: JobId,
  workerName: string,
  message: string,
): Promise<boolean> {
  const updated = await connection('jobs')
    .where({ id, status: 'running', worker_name: workerName })
    .update({ status: 'failed', finished_at: connection.fn.now(), error_message: message })
  return updated === 1
}

/** Puts the job back to be tried again after a pause. */
export async function postponeJob(
  connection: Connection,
  id: JobId,
  workerName: string,
  postponement: { message: string; delayMs: number },
): Promise<boolean> {
  const updated = await connection('jobs')
    .where({ id, status: 'running', worker_name: workerName })
    .update({
      status: 'waiting',
      queued_at: null,
      error_message: postponement.message,
      run_after: connection.raw("now() + ? * interval '1 millisecond'", [postponement.delayMs]),
    })
  return updated === 1
}

/** Gives the job back because its worker stops: the next one takes it at once, and the try does not count. */
export async function handBackJob(connection: Connection, id: JobId, workerName: string): Promise<boolean> {
  const updated = await connection('jobs')
    .where({ id, status: 'running', worker_name: workerName })
    .update({ status: 'waiting', queued_at: null, attempts: connection.raw('attempts - 1') })
  return updated === 1
}

/**
 * Jobs whose worker fell silent go back to waiting, ready to be queued again. A job whose row is locked is being
 * ended at this moment; waiting for it would keep every other job waiting too.
 */
export async function releaseSilentJobs(database: Database): Promise<number> {
  const silent = database('jobs')
    .where({ status: 'running' })
    .whereRaw("heartbeat_at < now() - ? * interval '1 millisecond'", [JOB_SILENCE_MS])
    .forUpdate()
    .skipLocked()
    .select('id')
  return database('jobs').whereIn('id', silent).update({ status: 'waiting', queued_at: null })
}

/**
 * Takes due jobs that are not in the queue, or were put there so long ago that the queue may have lost them,
 * marks them as queued and returns them. Two dispatchers at once never take the same row.
 */
export async function takeJobsToQueue(
  trx: Transaction,
  limits: { count: number; requeueAfterMs: number },
): Promise<{ id: JobId; kind: string }[]> {
  const due = trx('jobs')
    .where({ status: 'waiting' })
    // What only a newer version knows waits for a worker of that version.
    .whereIn('kind', Object.keys(jobPayloadSchemas))
    .whereRaw('run_after <= now()')
    .andWhere((stray) =>
      stray
        .whereNull('queued_at')
        .orWhereRaw("queued_at < now() - ? * interval '1 millisecond'", [limits.requeueAfterMs]),
    )
    .orderBy(['run_after', 'created_at'])
    .limit(limits.count)
    .forUpdate()
    .skipLocked()
    .select('id')
  const taken: { id: string; kind: string }[] = await trx('jobs')
    .whereIn('id', due)
    .update({ queued_at: trx.fn.now() })
    .returning(['id', 'kind'])
  return taken.map((job) => ({ id: jobIdSchema.parse(job.id), kind: job.kind }))
}
