import type {
  Decision,
  DetectionId,
  DisputeId,
  Instant,
  LocalDate,
  Month,
  PlayId,
  PlayStatus,
  RecordingId,
  ReviewState,
  StationId,
  StationLogId,
} from '@fieldfare/contracts'
import {
  applySort,
  containsPattern,
  fetchPage,
  restrictToStations,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
  type Scope,
} from '@fieldfare/database'
import type { Knex } from 'knex'
import { daysOfMonth } from '../../records/months.ts'
import {
  recordingReferenceSql,
  stationReferenceSql,
  type RecordingReference,
  type StationReference,
} from '../../records/references.ts'
import { streamRows } from '../../records/stream-rows.repository.ts'

export type DetectionRow = {
  id: DetectionId
  station: StationReference
  logId: StationLogId
  recording: RecordingReference
  startedAt: Instant
  endedAt: Instant
  durationSeconds: number
  confidence: number
  expectedFalseAlarms: number
  decision: Decision
  reviewState: ReviewState
  play: { id: PlayId; status: PlayStatus } | null
  openDisputeId: DisputeId | null
}

/** A detection with what backs it; the local day is that of its start in the station's zone. */
export type DetectionEvidenceRow = DetectionRow & {
  localDay: string
  logStartSeconds: number
  logEndSeconds: number
  referenceStartSeconds: number
  speedRatio: number
  agreeingHashes: number
  engineVersion: string
  evidence: unknown
  foundAt: Instant
  isLogAudioKept: boolean
  hasReferenceAudio: boolean
}

export type DetectionFilter = {
  stationId?: StationId | undefined
  recordingId?: RecordingId | undefined
  logId?: StationLogId | undefined
  month?: Month | undefined
  day?: LocalDate | undefined
  state?: ReviewState | undefined
  search?: string | undefined
  sort: string
}

const sortColumns = {
  startedAt: 'detections.started_at',
  durationSeconds: '(detections.ended_at - detections.started_at)',
  confidence: 'detections.confidence',
  title: 'lower(recordings.title)',
  station: 'stations.call_name',
} as const

/** The last review stands; without one, the engine's own decision does. */
const reviewStateSql = `coalesce(
  (select outcome from detection_reviews where detection_id = detections.id order by id desc limit 1),
  case detections.decision when 'accept' then 'accepted' else 'waiting' end)`

const localDaySql = '(detections.started_at at time zone stations.time_zone)::date'

/**
 * Days are those of the station. The two plain bounds say the same a day wider, so that PostgreSQL needs to look
 * into one or two monthly partitions only.
 */
function whereLocalDays(query: Knex.QueryBuilder, firstDay: string, nextFirstDay: string): void {
  query
    .whereRaw(`detections.started_at >= ?::timestamptz - interval '1 day'`, [`${firstDay}T00:00:00Z`])
    .whereRaw(`detections.started_at < ?::timestamptz + interval '1 day'`, [`${nextFirstDay}T00:00:00Z`])
    .whereRaw(`${localDaySql} >= ?::date and ${localDaySql} < ?::date`, [firstDay, nextFirstDay])
}

function nextDay(day: string): string {
  return new Date(Date.parse(day) + 86_400_000).toISOString().slice(0, 10)
}

function selectDetections(connection: Connection, scope: Scope): Knex.QueryBuilder {
  const query = connection('detections')
    .join('stations', 'stations.id', 'detections.station_id')
    .join('recordings', 'recordings.id', 'detections.recording_id')
    .leftJoin('plays', 'plays.detection_id', 'detections.id')
    .leftJoin('disputes', (join) =>
      join.on('disputes.play_id', 'plays.id').andOnVal('disputes.status', 'open'),
    )
    .select(
      {
        id: 'detections.id',
        logId: 'detections.log_id',
        startedAt: 'detections.started_at',
        endedAt: 'detections.ended_at',
        confidence: 'detections.confidence',
        expectedFalseAlarms: 'detections.expected_false_alarms',
        decision: 'detections.decision',
        openDisputeId: 'disputes.id',
      },
      connection.raw(`${stationReferenceSql} as station`),
      connection.raw(`${recordingReferenceSql} as recording`),
      connection.raw(`${reviewStateSql} as "reviewState"`),
      connection.raw(
        'extract(epoch from detections.ended_at - detections.started_at)::double precision as "durationSeconds"',
      ),
      connection.raw(
        `case when plays.id is not null then jsonb_build_object('id', plays.id, 'status', plays.status) end as play`,
      ),
    )
  return restrictToStations(query, scope, 'detections.station_id')
}

function filterDetections(query: Knex.QueryBuilder, filter: DetectionFilter): Knex.QueryBuilder {
  if (filter.stationId !== undefined) query.where('detections.station_id', filter.stationId)
  if (filter.recordingId !== undefined) query.where('detections.recording_id', filter.recordingId)
  if (filter.logId !== undefined) query.where('detections.log_id', filter.logId)
  if (filter.state !== undefined) query.whereRaw(`${reviewStateSql} = ?`, [filter.state])
  if (filter.day !== undefined) whereLocalDays(query, filter.day, nextDay(filter.day))
  if (filter.month !== undefined) {
    const { firstDay, nextFirstDay } = daysOfMonth(filter.month)
    whereLocalDays(query, firstDay, nextFirstDay)
  }
  const { search } = filter
  if (search !== undefined && search !== '') {
    query.where((match) =>
      match
        .whereRaw(`(recordings.title || ' ' || recordings.artist) ilike ?`, [containsPattern(search)])
        .orWhereILike('recordings.isrc', containsPattern(search.replaceAll('-', ''))),
    )
  }
  return query
}

function sortedDetections(database: Database, scope: Scope, filter: DetectionFilter): Knex.QueryBuilder {
  const query = filterDetections(selectDetections(database, scope), filter)
  return applySort(query, sortColumns, filter.sort, 'detections.id')
}

export async function listDetections(
  database: Database,
  scope: Scope,
  filter: DetectionFilter & PageRequest,
): Promise<PageResult<DetectionRow>> {
  return fetchPage<DetectionRow>(database, sortedDetections(database, scope, filter), filter)
}

export function streamDetections(
  database: Database,
  scope: Scope,
  filter: DetectionFilter,
): AsyncGenerator<DetectionRow> {
  return streamRows<DetectionRow>(database, sortedDetections(database, scope, filter))
}

export async function findDetection(
  connection: Connection,
  scope: Scope,
  id: DetectionId,
): Promise<DetectionEvidenceRow | null> {
  const row: DetectionEvidenceRow | undefined = await selectDetections(connection, scope)
    .where('detections.id', id)
    .first(
      {
        speedRatio: 'detections.speed_ratio',
        agreeingHashes: 'detections.agreeing_hashes',
        engineVersion: 'detections.engine_version',
        evidence: 'detections.evidence',
        foundAt: 'detections.created_at',
      },
      connection.raw(`${localDaySql} as "localDay"`),
      connection.raw('detections.log_start_ms / 1000.0::double precision as "logStartSeconds"'),
      connection.raw('detections.log_end_ms / 1000.0::double precision as "logEndSeconds"'),
      connection.raw('detections.reference_start_ms / 1000.0::double precision as "referenceStartSeconds"'),
      connection.raw(`exists (select from station_logs
        where id = detections.log_id and storage_key is not null) as "isLogAudioKept"`),
      connection.raw(`exists (select from reference_audio
        where recording_id = detections.recording_id and status = 'ready') as "hasReferenceAudio"`),
    )
  return row ?? null
}
