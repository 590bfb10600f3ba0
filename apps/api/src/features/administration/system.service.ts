import { jobLabels } from '@fieldfare/contracts'
import {
  countJobsByKind,
  listRecentFailures,
  listWorkers,
  readDatabaseDetails,
  type StorageUsage,
} from '@fieldfare/database'
import type { Dependencies } from '../../http/dependencies.ts'

const RECENT_FAILURES = 20

/** A part that does not answer is told as such; the page must work exactly when something does not. */
async function attempt<Result>(
  dependencies: Dependencies,
  part: string,
  ask: () => Promise<Result>,
): Promise<Result | null> {
  try {
    return await ask()
  } catch (error) {
    dependencies.logger.warn({ err: error, part }, 'a part of the system does not answer')
    return null
  }
}

async function describeQueues({ database }: Dependencies) {
  const counts = new Map((await countJobsByKind(database)).map((count) => [count.kind, count]))
  return Object.entries(jobLabels).map(([kind, label]) => ({
    kind,
    label,
    waiting: counts.get(kind)?.waiting ?? 0,
    running: counts.get(kind)?.running ?? 0,
    doneLastDay: counts.get(kind)?.doneLastDay ?? 0,
    failedLastDay: counts.get(kind)?.failedLastDay ?? 0,
    oldestWaitingAt: counts.get(kind)?.oldestWaitingAt ?? null,
  }))
}

/** What an administrator looks at when something is slow: queues, workers, database, storage. */
export async function describeSystem(dependencies: Dependencies) {
  const { database, redis, storage, clock } = dependencies
  const ask = <Result>(part: string, question: () => Promise<Result>) => attempt(dependencies, part, question)
  const [details, pong, usage, queues, workers, failures] = await Promise.all([
    ask('database', () => readDatabaseDetails(database)),
    ask('redis', () => redis.ping()),
    ask<StorageUsage>('storage', () => storage.usage()),
    ask('queues', () => describeQueues(dependencies)),
    ask('workers', () => listWorkers(database)),
    ask('failures', () => listRecentFailures(database, RECENT_FAILURES)),
  ])
  return {
    checkedAt: clock().toISOString(),
    database: { ok: details !== null, sizeBytes: details?.sizeBytes ?? 0, version: details?.version ?? '' },
    redis: { ok: pong !== null },
    storage: {
      kind: storage.kind,
      ok: usage !== null,
      objects: usage?.objects ?? 0,
      bytes: usage?.bytes ?? 0,
    },
    queues: queues ?? [],
    workers: workers ?? [],
    recentFailures: failures ?? [],
  }
}
