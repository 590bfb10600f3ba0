import type { LogStatus, StationLogId } from '@fieldfare/contracts'
import {
  enqueueJob,
  inTransaction,
  readLogProgress,
  recordAudit,
  type Actor,
  type PageResult,
  type Scope,
} from '@fieldfare/database'
import { presentSpans, readAirtime } from '../../airtime/airtime.ts'
import { localMonthOf } from '../../airtime/local-time.ts'
import { AppError, conflict, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { nextDedupeKey } from '../../jobs/numbered-job.repository.ts'
import { monthNotOpen } from '../../months/month-not-open.ts'
import { holdMonthStatus } from '../../records/month.repository.ts'
import { lockLog, markLogQueued } from './log-changes.repository.ts'
import type { LogWithProgress } from './log.presenter.ts'
import { findLog, listLogsInScope, type LogFilter, type LogRecord } from './logs.repository.ts'

const isInWork = (status: LogStatus) => status === 'queued' || status === 'analysing'

async function withProgress({ redis }: Dependencies, logs: readonly LogRecord[]): Promise<LogWithProgress[]> {
  const inWork = logs.filter(({ status }) => isInWork(status)).map(({ id }) => id)
  const known = await readLogProgress(redis, inWork)
  const progressOf = new Map(inWork.map((id, index) => [id, known[index] ?? null]))
  return logs.map((log) => ({ log, progress: progressOf.get(log.id) ?? null }))
}

export async function listLogs(
  dependencies: Dependencies,
  scope: Scope,
  filter: LogFilter,
): Promise<PageResult<LogWithProgress>> {
  const page = await listLogsInScope(dependencies.database, scope, filter)
  return { ...page, items: await withProgress(dependencies, page.items) }
}

export async function readLog(
  dependencies: Dependencies,
  scope: Scope,
  id: StationLogId,
): Promise<LogWithProgress> {
  const log = await findLog(dependencies.database, scope, id)
  if (log === null) throw notFound('This log')
  const [found] = await withProgress(dependencies, [log])
  return found ?? { log, progress: null }
}

/** What the airtime ribbon of the log shows; nothing until the recording was read. */
export async function readLogSpans({ database }: Dependencies, log: LogRecord) {
  if (log.airtimeFrom === null || log.airtimeTo === null || log.status === 'rejected') return []
  const airtime = await readAirtime(database, {
    stationId: log.station.id,
    fromMs: Date.parse(log.airtimeFrom),
    toMs: Date.parse(log.airtimeTo),
  })
  return presentSpans(airtime)
}

/** Asks for another run. What is known of the log stays until the new run has ended. */
export async function analyseAgain(
  dependencies: Dependencies,
  actor: Actor,
  id: StationLogId,
): Promise<void> {
  await inTransaction(dependencies.database, async (trx) => {
    const log = await lockLog(trx, id)
    if (log === null) throw notFound('This log')
    if (isInWork(log.status)) throw conflict('This log is being analysed already.')
    if (log.status === 'rejected') {
      throw conflict('This log was refused. Send the recording again, as the reason says.')
    }
    if (log.storageKey === null) {
      throw new AppError('audio-expired', {
        detail: 'The audio of this log is no longer kept, so it cannot be analysed again.',
      })
    }
    const month = localMonthOf(log.startedAt, log.station.timeZone)
    const status = await holdMonthStatus(trx, month)
    if (status !== 'open')
      throw monthNotOpen(month, status, 'Its plays stand still, so this log is not analysed again.')
    await markLogQueued(trx, id)
    const dedupeKey = await nextDedupeKey(trx, `analyse-log-${id}`)
    await enqueueJob(trx, { kind: 'analyse-log', payload: { logId: id }, dedupeKey })
    await recordAudit(trx, {
      actor,
      action: 'analyse-log-again',
      subjectKind: 'station-log',
      subjectId: id,
      summary: `Asked to analyse ${log.fileName} of ${log.station.name} again.`,
    })
  })
}
