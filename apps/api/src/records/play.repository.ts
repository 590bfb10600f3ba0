import type { DetectionId, DisputeId, Instant, PlayId, PlayStatus } from '@fieldfare/contracts'
import { restrictToStations, type Connection, type Scope } from '@fieldfare/database'
import type { Knex } from 'knex'
import {
  recordingReferenceSql,
  stationReferenceSql,
  workReferenceSql,
  type RecordingReference,
  type StationReference,
  type WorkReference,
} from './references.ts'

/** A play as lists show it. */
export type PlayRow = {
  id: PlayId
  detectionId: DetectionId | null
  station: StationReference
  recording: RecordingReference
  work: WorkReference | null
  startedAt: Instant
  endedAt: Instant
  durationSeconds: number
  localDay: string
  status: PlayStatus
  openDisputeId: DisputeId | null
}

/** Columns people may sort plays by. */
export const playSortColumns = {
  startedAt: 'plays.started_at',
  durationSeconds: '(plays.ended_at - plays.started_at)',
  title: 'lower(recordings.title)',
  station: 'stations.call_name',
} as const

/** Whether one of the parties holds, on the day of the play, a share of its recording or of the work behind it. */
const heldShareSql = `exists (
  select from shares
  where shares.party_id = any(?::uuid[])
    and (shares.recording_id = plays.recording_id or shares.work_id = recordings.work_id)
    and shares.valid_from <= plays.local_day
    and (shares.valid_to is null or shares.valid_to >= plays.local_day))`

/** The recordings the parties ever had to do with: few, and found by index, before days are compared play by play. */
const concernedRecordingsSql = `plays.recording_id in (
  select recording_id from shares where party_id = any(?::uuid[]) and recording_id is not null
  union
  select recordings.id from shares join recordings using (work_id) where party_id = any(?::uuid[]))`

/** Keeps plays in which one of the parties holds a share; the query joins `recordings`. */
export function whereSharedBy<Builder extends Knex.QueryBuilder>(
  query: Builder,
  partyIds: readonly string[],
): Builder {
  const ids = [...partyIds]
  query.whereRaw(concernedRecordingsSql, [ids, ids]).whereRaw(heldShareSql, [ids])
  return query
}

/** Uploaders see plays on their stations, publishers those their parties have a share in; the query joins `recordings`. */
export function restrictPlays<Builder extends Knex.QueryBuilder>(query: Builder, scope: Scope): Builder {
  return scope.kind === 'parties'
    ? whereSharedBy(query, scope.partyIds)
    : restrictToStations(query, scope, 'plays.station_id')
}

/** Plays in scope as {@link PlayRow}, joined with `stations`, `recordings` and `works`, neither filtered nor sorted. */
export function selectPlays(connection: Connection, scope: Scope): Knex.QueryBuilder {
  const query = connection('plays')
    .join('stations', 'stations.id', 'plays.station_id')
    .join('recordings', 'recordings.id', 'plays.recording_id')
    .leftJoin('works', 'works.id', 'recordings.work_id')
    .leftJoin('disputes', (join) =>
      join.on('disputes.play_id', 'plays.id').andOnVal('disputes.status', 'open'),
    )
    .select(
      {
        id: 'plays.id',
        detectionId: 'plays.detection_id',
        startedAt: 'plays.started_at',
        endedAt: 'plays.ended_at',
        localDay: 'plays.local_day',
        status: 'plays.status',
        openDisputeId: 'disputes.id',
      },
      connection.raw(`${stationReferenceSql} as station`),
      connection.raw(`${recordingReferenceSql} as recording`),
      connection.raw(`${workReferenceSql} as work`),
      connection.raw(
        'extract(epoch from plays.ended_at - plays.started_at)::double precision as "durationSeconds"',
      ),
    )
  return restrictPlays(query, scope)
}

async function firstRow<Row>(query: PromiseLike<Row[]>): Promise<Row | null> {
  const [row] = await query
  return row ?? null
}

/** One play in scope. */
export async function findPlay(connection: Connection, scope: Scope, id: PlayId): Promise<PlayRow | null> {
  return firstRow<PlayRow>(selectPlays(connection, scope).where('plays.id', id))
}
