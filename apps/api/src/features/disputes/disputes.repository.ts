import type {
  DetectionId,
  DisputeId,
  DisputeStatus,
  Instant,
  Month,
  PlayId,
  PlayStatus,
  Role,
  UserId,
} from '@fieldfare/contracts'
import {
  applySort,
  fetchPage,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
} from '@fieldfare/database'
import type { Knex } from 'knex'
import { daysOfMonth } from '../../records/months.ts'
import {
  recordingReferenceSql,
  stationReferenceSql,
  type RecordingReference,
  type StationReference,
} from '../../records/references.ts'

/** Clerks and auditors see all disputes, publishers those they opened. */
export type DisputeScope = { kind: 'all' } | { kind: 'opened-by'; userId: UserId }

export type DisputeRow = {
  id: DisputeId
  number: number
  status: DisputeStatus
  detectionId: DetectionId | null
  play: { id: PlayId; status: PlayStatus }
  station: StationReference
  recording: RecordingReference
  startedAt: Instant
  endedAt: Instant
  month: Month
  reason: string
  openedAt: Instant
  openedBy: UserId
  openedByName: string
  openedByRole: Role
  openedByEmail: string
  decidedAt: Instant | null
  decidedByName: string | null
  decisionReason: string | null
}

export type DisputeFilter = {
  status?: DisputeStatus | undefined
  month?: Month | undefined
  sort: string
}

const sortColumns = {
  number: 'disputes.number',
  openedAt: 'disputes.opened_at',
  station: 'stations.call_name',
  title: 'lower(recordings.title)',
} as const

function selectDisputes(connection: Connection, scope: DisputeScope): Knex.QueryBuilder {
  const query = connection('disputes')
    .join('plays', 'plays.id', 'disputes.play_id')
    .join('stations', 'stations.id', 'plays.station_id')
    .join('recordings', 'recordings.id', 'plays.recording_id')
    .join('users as opener', 'opener.id', 'disputes.opened_by')
    .leftJoin('users as decider', 'decider.id', 'disputes.decided_by')
    .select(
      {
        id: 'disputes.id',
        number: 'disputes.number',
        status: 'disputes.status',
        detectionId: 'plays.detection_id',
        startedAt: 'plays.started_at',
        endedAt: 'plays.ended_at',
        reason: 'disputes.reason',
        openedAt: 'disputes.opened_at',
        openedBy: 'disputes.opened_by',
        openedByName: 'opener.name',
        openedByRole: 'opener.role',
        openedByEmail: 'opener.email',
        decidedAt: 'disputes.decided_at',
        decidedByName: 'decider.name',
        decisionReason: 'disputes.decision_reason',
      },
      connection.raw(`to_char(plays.local_day, 'YYYY-MM') as month`),
      connection.raw(`jsonb_build_object('id', plays.id, 'status', plays.status) as play`),
      connection.raw(`${stationReferenceSql} as station`),
      connection.raw(`${recordingReferenceSql} as recording`),
    )
  if (scope.kind === 'opened-by') query.where('disputes.opened_by', scope.userId)
  return query
}

export async function listDisputes(
  database: Database,
  scope: DisputeScope,
  filter: DisputeFilter & PageRequest,
): Promise<PageResult<DisputeRow>> {
  const query = selectDisputes(database, scope)
  if (filter.status !== undefined) query.where('disputes.status', filter.status)
  if (filter.month !== undefined) {
    const { firstDay, nextFirstDay } = daysOfMonth(filter.month)
    query.where('plays.local_day', '>=', firstDay).where('plays.local_day', '<', nextFirstDay)
  }
  return fetchPage<DisputeRow>(database, applySort(query, sortColumns, filter.sort, 'disputes.id'), filter)
}

async function firstRow<Row>(query: PromiseLike<Row[]>): Promise<Row | null> {
  const [row] = await query
  return row ?? null
}

export async function findDispute(
  connection: Connection,
  scope: DisputeScope,
  id: DisputeId,
): Promise<DisputeRow | null> {
  return firstRow<DisputeRow>(selectDisputes(connection, scope).where('disputes.id', id))
}

export type DisputeMessage = {
  id: string
  at: Instant
  authorName: string
  authorRole: Role
  text: string
}

/** Messages of a dispute the caller has found in scope, oldest first. */
export async function listMessages(connection: Connection, id: DisputeId): Promise<DisputeMessage[]> {
  const rows: DisputeMessage[] = await connection('dispute_messages')
    .join('users', 'users.id', 'dispute_messages.author_id')
    .where('dispute_messages.dispute_id', id)
    .orderBy(['dispute_messages.created_at', 'dispute_messages.id'])
    .select({
      id: 'dispute_messages.id',
      at: 'dispute_messages.created_at',
      authorName: 'users.name',
      authorRole: 'users.role',
      text: 'dispute_messages.body',
    })
  return rows
}
