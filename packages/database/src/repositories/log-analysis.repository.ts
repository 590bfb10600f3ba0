import type { DetectionId, Instant, RecordingId, StationId, StationLogId } from '@fieldfare/contracts'
import type { Connection, Database, Transaction } from '../connection.ts'

/** What a worker must know of a log to analyse it. */
export type LogToAnalyse = {
  id: StationLogId
  stationId: StationId
  timeZone: string
  fileName: string
  storageKey: string | null
  startedAt: Instant
  status: string
}

function selectLog(connection: Connection, id: StationLogId) {
  return connection('station_logs as l')
    .join('stations as s', 's.id', 'l.station_id')
    .where('l.id', id)
    .first<LogToAnalyse | undefined>({
      id: 'l.id',
      stationId: 'l.station_id',
      timeZone: 's.time_zone',
      fileName: 'l.file_name',
      storageKey: 'l.storage_key',
      startedAt: 'l.started_at',
      status: 'l.status',
    })
}

export async function findLogToAnalyse(
  connection: Connection,
  id: StationLogId,
): Promise<LogToAnalyse | null> {
  return (await selectLog(connection, id)) ?? null
}

/** Takes the row for the rest of the transaction, so that two workers never write one log's results at once. */
export async function lockLogToAnalyse(trx: Transaction, id: StationLogId): Promise<LogToAnalyse | null> {
  return (await selectLog(trx, id).forUpdate('l')) ?? null
}

export async function markLogAnalysing(connection: Connection, id: StationLogId): Promise<void> {
  await connection('station_logs')
    .where({ id })
    .whereIn('status', ['queued', 'analysing'])
    .update({ status: 'analysing' })
}

/**
 * A log that cannot be used (`rejected`, the sender must act) or that we could not finish (`failed`, we must). A log
 * that was analysed before keeps its airtime, since its plays still count: its new run failed, whatever the reason.
 */
export async function markLogUnusable(
  connection: Connection,
  id: StationLogId,
  outcome: { status: 'rejected' | 'failed'; code: string; message: string },
): Promise<void> {
  await connection('station_logs')
    .where({ id })
    .update({
      status: connection.raw(`case when analysed_at is null then ? else 'failed' end`, [outcome.status]),
      failure_code: outcome.code,
      failure_message: outcome.message,
      airtime: connection.raw('case when analysed_at is not null then airtime end'),
    })
}

export type HeldAirtime = { fileName: string; from: Instant; to: Instant }

/** Other logs of the station whose airtime meets a stretch, in order. */
export async function listOverlappingLogs(
  connection: Connection,
  log: { id: StationLogId; stationId: StationId },
  stretch: { from: Date; to: Date },
): Promise<HeldAirtime[]> {
  return connection('station_logs')
    .where({ station_id: log.stationId })
    .whereNot({ id: log.id })
    .whereNot({ status: 'rejected' })
    .whereRaw('airtime && tstzrange(?, ?)', [stretch.from, stretch.to])
    .orderByRaw('lower(airtime)')
    .select<HeldAirtime[]>(
      { fileName: 'file_name' },
      connection.raw('lower(airtime) as "from"'),
      connection.raw('upper(airtime) as "to"'),
    )
}

export type NewDetection = {
  id: DetectionId
  recordingNumber: number
  startedAt: Date
  endedAt: Date
  logStartMs: number
  logEndMs: number
  referenceStartMs: number
  speedRatio: number
  confidence: number
  expectedFalseAlarms: number
  decision: 'accept' | 'review'
  agreeingHashes: number
  evidence: readonly { logSeconds: number; referenceSeconds: number }[]
}

const ROWS_PER_INSERT = 200

async function recordingIdsByNumber(
  trx: Transaction,
  numbers: readonly number[],
): Promise<Map<number, RecordingId>> {
  const rows: { id: RecordingId; number: number }[] = await trx('recordings')
    .whereIn('recording_number', [...new Set(numbers)])
    .select({ id: 'id', number: 'recording_number' })
  return new Map(rows.map((row) => [row.number, row.id]))
}

async function ensurePartitions(trx: Transaction, detections: readonly NewDetection[]): Promise<void> {
  const months = new Map(
    detections.map((detection) => [detection.startedAt.toISOString().slice(0, 7), detection.startedAt]),
  )
  for (const moment of months.values()) await trx.raw('select ensure_detections_partition(?)', [moment])
}

/**
 * Writes detections that are not held yet: the same recording at the same place of the log is the same detection,
 * whichever run found it.
 */
export async function insertDetections(
  trx: Transaction,
  log: LogToAnalyse,
  engineVersion: string,
  detections: readonly NewDetection[],
): Promise<number> {
  if (detections.length === 0) return 0
  await ensurePartitions(trx, detections)
  const recordingIds = await recordingIdsByNumber(
    trx,
    detections.map((detection) => detection.recordingNumber),
  )
  const rows = detections.map((detection) => {
    const recordingId = recordingIds.get(detection.recordingNumber)
    if (recordingId === undefined)
      throw new Error(`The index knows recording number ${detection.recordingNumber}, the database does not`)
    return {
      id: detection.id,
      started_at: detection.startedAt,
      ended_at: detection.endedAt,
      log_id: log.id,
      station_id: log.stationId,
      recording_id: recordingId,
      engine_version: engineVersion,
      log_start_ms: detection.logStartMs,
      log_end_ms: detection.logEndMs,
      reference_start_ms: detection.referenceStartMs,
      speed_ratio: detection.speedRatio,
      confidence: detection.confidence,
      expected_false_alarms: detection.expectedFalseAlarms,
      decision: detection.decision,
      agreeing_hashes: detection.agreeingHashes,
      evidence: JSON.stringify(detection.evidence),
    }
  })
  let inserted = 0
  for (let first = 0; first < rows.length; first += ROWS_PER_INSERT) {
    const ids: unknown[] = await trx('detections')
      .insert(rows.slice(first, first + ROWS_PER_INSERT))
      .onConflict()
      .ignore()
      .returning('id')
    inserted += ids.length
  }
  return inserted
}

/** The name under which plays are made without a person deciding. */
export const ENGINE_ACTOR = 'Detection engine'

/**
 * Makes plays of the accepted detections of a log that have none, with the event that says so. A detection that a
 * person has decided on keeps what they decided. A play ends where the airtime of its log does: where two logs
 * overlap, the seconds they share count once, and the rest of a tune that runs from one into the other still counts.
 */
export async function insertPlaysForAccepted(
  trx: Transaction,
  logId: StationLogId,
  airtime: { from: Date; to: Date },
): Promise<number> {
  const result: { rows: unknown[] } = await trx.raw(
    `with made as (
       insert into plays
         (detection_id, detection_started_at, station_id, recording_id, started_at, ended_at, local_day)
       select d.id, d.started_at, d.station_id, d.recording_id, held.started_at, held.ended_at,
         (held.started_at at time zone s.time_zone)::date
       from detections d
       join stations s on s.id = d.station_id
       cross join lateral (
         select greatest(d.started_at, :from::timestamptz) as started_at, least(d.ended_at, :to::timestamptz) as ended_at
       ) held
       where d.log_id = :logId and d.decision = 'accept' and held.started_at < held.ended_at
         and not exists (select 1 from detection_reviews r where r.detection_id = d.id)
         and not exists (select 1 from plays p where p.detection_id = d.id)
       order by d.started_at, d.id
       on conflict do nothing
       returning id
     )
     insert into play_events (play_id, kind, actor_name) select id, 'created', :actor from made returning play_id`,
    { logId, actor: ENGINE_ACTOR, ...airtime },
  )
  return result.rows.length
}

export type LogSpan = { startMs: number; endMs: number; kind: 'music' | 'speech' | 'silence' }

export async function replaceLogSpans(
  trx: Transaction,
  logId: StationLogId,
  spans: readonly LogSpan[],
): Promise<void> {
  await trx('log_spans').where({ log_id: logId }).delete()
  const rows = spans.map((span) => ({
    log_id: logId,
    start_ms: span.startMs,
    end_ms: span.endMs,
    kind: span.kind,
  }))
  await trx.batchInsert('log_spans', rows, 500)
}

export type FinishedAnalysis = {
  engineVersion: string
  catalogueRecordings: number
  detections: number
  decodeMs: number
  analyseMs: number
  format: string
  durationMs: number
  airtime: { from: Date; to: Date }
  warnings: readonly string[]
  musicMs: number
  speechMs: number
  silenceMs: number
}

/** @throws ConstraintViolation station_logs_no_overlap when another log took the airtime meanwhile */
export async function markLogAnalysed(
  trx: Transaction,
  logId: StationLogId,
  analysis: FinishedAnalysis,
): Promise<void> {
  await trx('station_logs')
    .where({ id: logId })
    .update({
      status: 'analysed',
      failure_code: null,
      failure_message: null,
      format: analysis.format,
      duration_ms: analysis.durationMs,
      airtime: trx.raw('tstzrange(?, ?)', [analysis.airtime.from, analysis.airtime.to]),
      warnings: [...analysis.warnings],
      music_ms: analysis.musicMs,
      speech_ms: analysis.speechMs,
      silence_ms: analysis.silenceMs,
      analysed_at: trx.fn.now(),
    })
  await trx('log_analyses').insert({
    log_id: logId,
    engine_version: analysis.engineVersion,
    catalogue_recordings: analysis.catalogueRecordings,
    detections: analysis.detections,
    decode_ms: analysis.decodeMs,
    analyse_ms: analysis.analyseMs,
  })
}

export type ClipSourceAudio = {
  logStorageKey: string | null
  logStartMs: number
  referenceStorageKey: string | null
  referenceStartMs: number
  durationMs: number
  speedRatio: number
}

/** Where the sound behind a detection lies: in its log, and in the newest ready reference of its recording. */
export async function findClipAudio(database: Database, id: DetectionId): Promise<ClipSourceAudio | null> {
  const row: ClipSourceAudio | undefined = await database('detections as d')
    .join('station_logs as l', 'l.id', 'd.log_id')
    .where('d.id', id)
    .first(
      { logStorageKey: 'l.storage_key', speedRatio: 'd.speed_ratio' },
      database.raw('d.log_start_ms::float8 as "logStartMs"'),
      database.raw('d.reference_start_ms::float8 as "referenceStartMs"'),
      database.raw('(d.log_end_ms - d.log_start_ms)::float8 as "durationMs"'),
      database.raw(`(
        select a.storage_key from reference_audio a
        where a.recording_id = d.recording_id and a.status = 'ready' order by a.uploaded_at desc, a.id limit 1
      ) as "referenceStorageKey"`),
    )
  return row ?? null
}
