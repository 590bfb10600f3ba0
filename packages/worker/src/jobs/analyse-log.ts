import { AudioError, extensionMatchesFormat, probeAudio, type AudioProbe } from '@fieldfare/audio'
import type { LogProgress } from '@fieldfare/contracts'
import {
  clearLogProgress,
  ConstraintViolation,
  findLogToAnalyse,
  insertDetections,
  insertPlaysForAccepted,
  listOverlappingLogs,
  lockLogToAnalyse,
  markLogAnalysed,
  markLogAnalysing,
  markLogUnusable,
  replaceLogSpans,
  writeLogProgress,
  type Connection,
  type LogToAnalyse,
  type Transaction,
} from '@fieldfare/database'
import { ENGINE_VERSION } from '@fieldfare/fingerprint'
import { DateTime } from 'luxon'
import type { AnalysisOutcome } from '../engine/messages.ts'
import { UnusableAudio } from '../engine/thread-pool.ts'
import { decideAirtime } from '../log-analysis/airtime.ts'
import { describeDetections } from '../log-analysis/detections.ts'
import { markIdentifiedAsMusic, totalMs } from '../log-analysis/spans.ts'
import { JobRefused, type JobContext, type JobHandler } from './job-context.ts'

/** The log cannot be used as it is; the message tells the sender what is wrong and what to do. */
class LogRejected extends Error {
  override readonly name = 'LogRejected'
  readonly code: string

  constructor(code: string, message: string, options?: ErrorOptions) {
    super(message, options)
    this.code = code
  }
}

function stationTime(instant: string, timeZone: string): string {
  return DateTime.fromISO(instant, { zone: timeZone }).toFormat('yyyy-LL-dd HH:mm:ss')
}

/** @throws LogRejected where the log covers airtime that is held already */
async function freeAirtime(connection: Connection, log: LogToAnalyse, durationSeconds: number) {
  const from = new Date(log.startedAt)
  const to = new Date(from.getTime() + Math.round(durationSeconds * 1000))
  const decision = decideAirtime({ from, to }, await listOverlappingLogs(connection, log, { from, to }))
  if (decision.kind === 'free') return decision
  const { held, overlapMs } = decision
  throw new LogRejected(
    'overlapping-log',
    `This recording overlaps ${held.fileName}, which is held from ${stationTime(held.from, log.timeZone)} to ` +
      `${stationTime(held.to, log.timeZone)} (${log.timeZone}), by ${Math.round(overlapMs / 1000)} seconds. ` +
      'Check the start time and send it again.',
  )
}

function warningsOf(log: LogToAnalyse, probe: AudioProbe, outcome: AnalysisOutcome): string[] {
  const warnings: string[] = []
  if (outcome.isTruncated)
    warnings.push(
      'The recording breaks off before its end. What is there was analysed; the rest counts as a gap.',
    )
  if (!extensionMatchesFormat(log.fileName, probe.format))
    warnings.push(`The file name suggests another format, but the content is ${probe.format.label}.`)
  return warnings
}

/** Progress at most once a report of the thread, with an estimate from the pace so far. */
function createProgressReporter(context: JobContext, log: LogToAnalyse) {
  const startedAt = Date.now()
  return async (stage: LogProgress['stage'], doneSeconds: number, totalSeconds: number | null) => {
    const elapsedSeconds = (Date.now() - startedAt) / 1000
    const isPaceKnown = totalSeconds !== null && doneSeconds > 0 && elapsedSeconds > 1
    const progress: LogProgress = {
      stage,
      doneSeconds,
      totalSeconds,
      secondsLeft: isPaceKnown
        ? Math.max(0, (elapsedSeconds / doneSeconds) * (totalSeconds - doneSeconds))
        : null,
    }
    await writeLogProgress(context.redis, log.id, progress)
    await context.tell({
      kind: 'log-progress',
      logId: log.id,
      stationId: log.stationId,
      status: 'analysing',
      progress,
    })
  }
}

type Reading = { probe: AudioProbe; outcome: AnalysisOutcome }

async function readLog(context: JobContext, log: LogToAnalyse, storageKey: string): Promise<Reading> {
  const { database, storage, catalogue, threads, signal, logger } = context
  const report = createProgressReporter(context, log)
  await report('checking', 0, null)
  return storage.withLocalFile(storageKey, async (path) => {
    const probe = await probeAudio(path)
    // Refused now rather than after an hour's work; the constraint has the last word when the results are written.
    await freeAirtime(database, log, probe.durationMs / 1000)
    const changes = await catalogue.refresh()
    const outcome = await threads.analyse(path, changes, {
      signal,
      onProgress(doneSeconds) {
        report('matching', doneSeconds, Math.max(doneSeconds, probe.durationMs / 1000)).catch(
          (error: unknown) => logger.warn({ error }, 'progress could not be told'),
        )
      },
    })
    if (outcome.isSilent)
      throw new LogRejected(
        'silent',
        'The recording is silent from beginning to end. Check the recorder and its input, then send the recording again.',
      )
    await report('writing', outcome.durationSeconds, outcome.durationSeconds)
    return { probe, outcome }
  })
}

async function writeResults(trx: Transaction, log: LogToAnalyse, { probe, outcome }: Reading): Promise<void> {
  const locked = await lockLogToAnalyse(trx, log.id)
  if (locked === null) throw new JobRefused('The log is no longer there.')
  const airtime = await freeAirtime(trx, log, outcome.durationSeconds)
  const durationMs = Math.round(outcome.durationSeconds * 1000)
  const detections = describeDetections(
    { id: log.id, startedAt: new Date(log.startedAt) },
    ENGINE_VERSION,
    outcome.detections,
  )
  await insertDetections(trx, log, ENGINE_VERSION, detections)
  await insertPlaysForAccepted(trx, log.id, airtime)
  const spans = markIdentifiedAsMusic(
    outcome.spans.map(({ kind, startSeconds, endSeconds }) => ({
      kind,
      startMs: Math.round(startSeconds * 1000),
      endMs: Math.round(endSeconds * 1000),
    })),
    detections
      .filter(({ decision }) => decision === 'accept')
      .map(({ logStartMs, logEndMs }) => ({ startMs: logStartMs, endMs: logEndMs })),
    durationMs,
  )
  await replaceLogSpans(trx, log.id, spans)
  await markLogAnalysed(trx, log.id, {
    engineVersion: ENGINE_VERSION,
    catalogueRecordings: outcome.catalogueRecordings,
    detections: detections.length,
    decodeMs: outcome.decodeMs,
    analyseMs: outcome.analyseMs,
    format: probe.format.label,
    durationMs,
    airtime,
    warnings: warningsOf(log, probe, outcome),
    musicMs: totalMs(spans, 'music'),
    speechMs: totalMs(spans, 'speech'),
    silenceMs: totalMs(spans, 'silence'),
  })
}

/** What the sender must be told, where an error is about the log and not about us. */
function asRejection(error: unknown): { code: string; message: string } | null {
  if (error instanceof LogRejected) return { code: error.code, message: error.message }
  if (error instanceof UnusableAudio || error instanceof AudioError)
    return { code: error.code, message: error.userMessage }
  if (!(error instanceof ConstraintViolation)) return null
  if (error.constraint === 'station_logs_no_overlap')
    return {
      code: 'overlapping-log',
      message:
        'Another recording of the same time was taken in meanwhile. Check the start time and send it again.',
    }
  if (error.constraint === 'plays_month_open')
    return {
      code: 'month-closed',
      message:
        'The month of this recording was closed meanwhile. Ask the distribution desk to open it again.',
    }
  return null
}

/** Reads a log, writes what was found in it, once, however often it runs. */
export const analyseLogJob: JobHandler<'analyse-log'> = {
  async run(context, { logId }) {
    const { database, redis, tell, finish } = context
    const log = await findLogToAnalyse(database, logId)
    if (log === null) throw new JobRefused('The log is no longer there.')
    const event = { kind: 'log-progress', logId, stationId: log.stationId, progress: null } as const
    if (log.status !== 'queued' && log.status !== 'analysing') {
      await finish(async () => undefined)
      return
    }
    await markLogAnalysing(database, logId)
    try {
      if (log.storageKey === null)
        throw new LogRejected(
          'audio-expired',
          'The audio of this log is no longer kept, so it cannot be analysed.',
        )
      const reading = await readLog(context, log, log.storageKey)
      await finish((trx) => writeResults(trx, log, reading))
      await tell({ ...event, status: 'analysed' })
    } catch (error) {
      const rejection = asRejection(error)
      if (rejection === null) throw error
      await finish((trx) => markLogUnusable(trx, logId, { status: 'rejected', ...rejection }))
      await tell({ ...event, status: 'rejected' })
    } finally {
      await clearLogProgress(redis, logId)
    }
  },
  onFailure: (trx, { logId }) =>
    markLogUnusable(trx, logId, {
      status: 'failed',
      code: 'analysis-failed',
      message:
        'The analysis broke off on our side, not because of the recording. The desk can start it again; nothing needs to be sent anew.',
    }),
}
