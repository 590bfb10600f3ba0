import type { Instant } from '@fieldfare/contracts'
import type { Database } from '../connection.ts'

export type WorkerHeartbeat = {
  name: string
  lastSeenAt: Instant
  indexRecordings: number
  indexBytes: number
}

/** A worker says it is there, and how much it holds in memory. */
export async function beatWorker(
  database: Database,
  worker: { name: string; indexRecordings: number; indexBytes: number },
): Promise<void> {
  await database('worker_heartbeats')
    .insert({ name: worker.name, index_recordings: worker.indexRecordings, index_bytes: worker.indexBytes })
    .onConflict('name')
    .merge({
      last_seen_at: database.fn.now(),
      index_recordings: worker.indexRecordings,
      index_bytes: worker.indexBytes,
    })
}

/** A worker that stops on purpose takes its name off the list. */
export async function removeWorker(database: Database, name: string): Promise<void> {
  await database('worker_heartbeats').where({ name }).delete()
}

/** Workers that were there within a day, newest first. */
export async function listWorkers(database: Database): Promise<WorkerHeartbeat[]> {
  return database('worker_heartbeats')
    .whereRaw("last_seen_at > now() - interval '1 day'")
    .orderBy('last_seen_at', 'desc')
    .select<WorkerHeartbeat[]>(
      { name: 'name', lastSeenAt: 'last_seen_at', indexRecordings: 'index_recordings' },
      database.raw('index_bytes::float8 as "indexBytes"'),
    )
}
