import type { Instant } from '@fieldfare/contracts'
import type { Database } from '../connection.ts'

export type JobKindCount = {
  kind: string
  waiting: number
  running: number
  doneLastDay: number
  failedLastDay: number
  oldestWaitingAt: Instant | null
}

export type JobFailure = { kind: string; message: string; failedAt: Instant }

/** How much of each kind waits, runs and ended within a day. */
export async function countJobsByKind(database: Database): Promise<JobKindCount[]> {
  return database('jobs')
    .whereIn('status', ['waiting', 'running'])
    .orWhereRaw("finished_at > now() - interval '1 day'")
    .groupBy('kind')
    .orderBy('kind')
    .select<JobKindCount[]>(
      'kind',
      database.raw("(count(*) filter (where status = 'waiting'))::int as waiting"),
      database.raw("(count(*) filter (where status = 'running'))::int as running"),
      database.raw(`(count(*) filter (where status = 'done'))::int as "doneLastDay"`),
      database.raw(`(count(*) filter (where status = 'failed'))::int as "failedLastDay"`),
      database.raw(`min(created_at) filter (where status = 'waiting') as "oldestWaitingAt"`),
    )
}

/** The jobs that failed last, newest first. */
export async function listRecentFailures(database: Database, count: number): Promise<JobFailure[]> {
  return database('jobs')
    .where({ status: 'failed' })
    .orderBy('finished_at', 'desc')
    .limit(count)
    .select<JobFailure[]>('kind', { message: 'error_message', failedAt: 'finished_at' })
}
