import type { EndpointResult, LogProgress, uploadLog } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import { canAnalyseAgain } from './logs.policy.ts'
import type { LogRecord } from './logs.repository.ts'

function endOf(log: LogRecord): string | null {
  if (log.durationSeconds === null) return null
  return new Date(Date.parse(log.startedAt) + log.durationSeconds * 1000).toISOString()
}

/** A log with the progress last heard of. */
export type LogWithProgress = { log: LogRecord; progress: LogProgress | null }

export function presentLog(
  { log, progress }: LogWithProgress,
  actor: Pick<Actor, 'role'>,
): EndpointResult<typeof uploadLog> {
  const { station } = log
  return {
    id: log.id,
    station: { id: station.id, callName: station.callName, name: station.name, timeZone: station.timeZone },
    fileName: log.fileName,
    sizeBytes: log.sizeBytes,
    format: log.format,
    startedAt: log.startedAt,
    endedAt: endOf(log),
    durationSeconds: log.durationSeconds,
    status: log.status,
    progress,
    failure:
      log.failureCode === null || log.failureMessage === null
        ? null
        : { code: log.failureCode, message: log.failureMessage },
    warnings: log.warnings,
    uploadedByName: log.uploadedByName,
    uploadedAt: log.uploadedAt,
    analysedAt: log.analysedAt,
    musicSeconds: log.musicSeconds,
    speechSeconds: log.speechSeconds,
    silenceSeconds: log.silenceSeconds,
    identifiedSeconds: log.identifiedSeconds,
    detections: log.detections,
    canAnalyseAgain: canAnalyseAgain(actor, log),
  }
}
