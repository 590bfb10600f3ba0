import { logProgressSchema, type LogProgress, type StationLogId } from '@fieldfare/contracts'
import type { Redis } from 'ioredis'

/** A worker that falls silent for this long is no longer believed. */
const KEPT_SECONDS = 120

function keyOf(logId: StationLogId): string {
  return `fieldfare:log-progress:${logId}`
}

/** Keeps how far a log is, for those who open the page between two messages. */
export async function writeLogProgress(
  redis: Redis,
  logId: StationLogId,
  progress: LogProgress,
): Promise<void> {
  await redis.set(keyOf(logId), JSON.stringify(progress), 'EX', KEPT_SECONDS)
}

export async function clearLogProgress(redis: Redis, logId: StationLogId): Promise<void> {
  await redis.del(keyOf(logId))
}

/** How far each of the logs is; null where nothing is known, in the order asked. */
export async function readLogProgress(
  redis: Redis,
  logIds: readonly StationLogId[],
): Promise<(LogProgress | null)[]> {
  if (logIds.length === 0) return []
  const values = await redis.mget(logIds.map(keyOf))
  return values.map((value) => {
    if (value === null) return null
    return logProgressSchema.safeParse(JSON.parse(value)).data ?? null
  })
}
