import type { Instant, PartyId, RecordingId, ReferenceStatus, WorkId } from '@fieldfare/contracts'
import {
  applySort,
  containsPattern,
  fetchPage,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
  type Scope,
  type Transaction,
} from '@fieldfare/database'
import { workReferenceSql, type WorkReference } from '../../records/references.ts'
import { sharesSql, type ShareRecord } from '../../shares/shares.repository.ts'
import { recordingHeldBy, recordingsInScope } from './catalogue-scope.ts'
import { codePattern } from './code-search.ts'

export type RecordingDetails = {
  isrc: string
  title: string
  artist: string
  durationSeconds: number | null
  workId: WorkId | null
}

export type RecordingRecord = {
  id: RecordingId
  isrc: string
  title: string
  artist: string
  durationSeconds: number | null
  work: WorkReference | null
  referenceStatus: ReferenceStatus
  shares: ShareRecord[]
  plays: number
  playedSeconds: number
  lastPlayedAt: Instant | null
}

export type RecordingFilter = PageRequest & {
  search?: string | undefined
  partyId?: PartyId | undefined
  reference?: ReferenceStatus | undefined
  sort: string
}

const countedPlays = (what: string) =>
  `(select ${what} from plays where plays.recording_id = recordings.id and plays.status = 'counted')`

/** Ready once any of its audio is; until then as the latest audio stands. */
const referenceStatus = `coalesce((select reference_audio.status from reference_audio
  where reference_audio.recording_id = recordings.id
  order by (reference_audio.status = 'ready') desc, reference_audio.uploaded_at desc limit 1), 'none')`

const sortColumns = {
  title: 'recordings.title',
  artist: 'recordings.artist',
  isrc: 'recordings.isrc',
  plays: 'plays',
  lastPlayedAt: '"lastPlayedAt"',
}

function selectRecordings(connection: Connection, scope: Scope) {
  const query = connection('recordings')
    .leftJoin('works', 'works.id', 'recordings.work_id')
    .select<RecordingRecord[]>(
      {
        id: 'recordings.id',
        isrc: 'recordings.isrc',
        title: 'recordings.title',
        artist: 'recordings.artist',
      },
      connection.raw('recordings.duration_ms::float8 / 1000 as "durationSeconds"'),
      connection.raw(`${workReferenceSql} as work`),
      connection.raw(`${referenceStatus} as "referenceStatus"`),
      connection.raw(sharesSql('recording_id', 'recordings.id')),
      connection.raw(`${countedPlays('count(*)::int')} as plays`),
      connection.raw(
        `coalesce(${countedPlays('sum(extract(epoch from plays.ended_at - plays.started_at))')}, 0)::float8 as "playedSeconds"`,
      ),
      connection.raw(`${countedPlays('max(plays.started_at)')} as "lastPlayedAt"`),
    )
  const condition = recordingsInScope(scope)
  if (condition !== null) query.whereRaw(condition.sql, condition.bindings)
  return query
}

export async function listRecordingsInScope(
  database: Database,
  scope: Scope,
  filter: RecordingFilter,
): Promise<PageResult<RecordingRecord>> {
  const query = selectRecordings(database, scope)
  const { search, partyId, reference } = filter
  if (partyId !== undefined) {
    const held = recordingHeldBy([partyId])
    if (held !== null) query.whereRaw(held.sql, held.bindings)
  }
  if (reference !== undefined) query.whereRaw(`${referenceStatus} = ?`, [reference])
  if (search !== undefined && search !== '') {
    query.where((match) => {
      match.whereRaw("(recordings.title || ' ' || recordings.artist) ilike ?", [containsPattern(search)])
      const code = codePattern(search)
      if (code !== null) match.orWhere('recordings.isrc', 'like', code)
    })
  }
  return fetchPage<RecordingRecord>(
    database,
    applySort(query, sortColumns, filter.sort, 'recordings.id'),
    filter,
  )
}

export async function findRecording(
  connection: Connection,
  scope: Scope,
  id: RecordingId,
): Promise<RecordingRecord | null> {
  const row: RecordingRecord | undefined = await selectRecordings(connection, scope)
    .where('recordings.id', id)
    .first()
  return row ?? null
}

export async function findRecordingByIsrc(
  connection: Connection,
  isrc: string,
): Promise<{ id: RecordingId; title: string; artist: string } | null> {
  const row: { id: RecordingId; title: string; artist: string } | undefined = await connection('recordings')
    .where({ isrc })
    .first('id', 'title', 'artist')
  return row ?? null
}

export async function lockRecording(trx: Transaction, id: RecordingId): Promise<RecordingDetails | null> {
  const row: RecordingDetails | undefined = await trx('recordings')
    .where({ id })
    .forUpdate()
    .first(
      { isrc: 'isrc', title: 'title', artist: 'artist', workId: 'work_id' },
      trx.raw('duration_ms::float8 / 1000 as "durationSeconds"'),
    )
  return row ?? null
}

function detailColumns(details: RecordingDetails) {
  return {
    isrc: details.isrc,
    title: details.title,
    artist: details.artist,
    duration_ms: details.durationSeconds === null ? null : Math.round(details.durationSeconds * 1000),
    work_id: details.workId,
  }
}

/** @throws ConstraintViolation recordings_isrc_key, recordings_work_fkey */
export async function insertRecording(trx: Transaction, details: RecordingDetails): Promise<RecordingId> {
  const rows: { id: RecordingId }[] = await trx('recordings').insert(detailColumns(details)).returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new recording came back without an id')
  return row.id
}

/** @throws ConstraintViolation recordings_isrc_key, recordings_work_fkey */
export async function updateRecordingDetails(
  trx: Transaction,
  id: RecordingId,
  details: RecordingDetails,
): Promise<void> {
  await trx('recordings').where({ id }).update(detailColumns(details))
}
