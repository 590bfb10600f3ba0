import type { Instant, RecordingId, ReferenceAudioId, ReferenceStatus, UserId } from '@fieldfare/contracts'
import {
  fetchPage,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
  type Scope,
  type Transaction,
} from '@fieldfare/database'
import { recordingReferenceSql, type RecordingReference } from '../../records/references.ts'

export type AudioStatus = Exclude<ReferenceStatus, 'none'>

export type ReferenceAudioRecord = {
  id: ReferenceAudioId
  recording: RecordingReference
  fileName: string
  sizeBytes: number
  format: string | null
  durationSeconds: number | null
  status: AudioStatus
  failure: string | null
  landmarkHashes: number | null
  uploadedAt: Instant
  uploadedByName: string
}

export type ReferenceAudioFilter = PageRequest & {
  status?: AudioStatus | undefined
  recordingId?: RecordingId | undefined
}

export type NewReferenceAudio = {
  id: ReferenceAudioId
  recordingId: RecordingId
  fileName: string
  sizeBytes: number
  sha256: Buffer
  storageKey: string
  format: string
  uploadedBy: UserId
}

/** Reference audio is the desk's own: whoever sees only some stations or parties sees none of it. */
function selectReferenceAudio(connection: Connection, scope: Scope) {
  const query = connection('reference_audio')
    .join('recordings', 'recordings.id', 'reference_audio.recording_id')
    .join('users', 'users.id', 'reference_audio.uploaded_by')
    .select<ReferenceAudioRecord[]>(
      {
        id: 'reference_audio.id',
        fileName: 'reference_audio.file_name',
        format: 'reference_audio.format',
        status: 'reference_audio.status',
        failure: 'reference_audio.failure',
        landmarkHashes: 'reference_audio.landmark_hashes',
        uploadedAt: 'reference_audio.uploaded_at',
        uploadedByName: 'users.name',
      },
      connection.raw(`${recordingReferenceSql} as recording`),
      connection.raw('reference_audio.size_bytes::float8 as "sizeBytes"'),
      connection.raw('reference_audio.duration_ms::float8 / 1000 as "durationSeconds"'),
    )
  if (scope.kind !== 'all') query.whereRaw('false')
  return query
}

export async function listReferenceAudioInScope(
  database: Database,
  scope: Scope,
  filter: ReferenceAudioFilter,
): Promise<PageResult<ReferenceAudioRecord>> {
  const query = selectReferenceAudio(database, scope).orderBy([
    { column: 'reference_audio.uploaded_at', order: 'desc' },
    { column: 'reference_audio.id' },
  ])
  if (filter.status !== undefined) query.where('reference_audio.status', filter.status)
  if (filter.recordingId !== undefined) query.where('reference_audio.recording_id', filter.recordingId)
  return fetchPage<ReferenceAudioRecord>(database, query, filter)
}

export async function findReferenceAudio(
  connection: Connection,
  scope: Scope,
  id: ReferenceAudioId,
): Promise<ReferenceAudioRecord | null> {
  const row: ReferenceAudioRecord | undefined = await selectReferenceAudio(connection, scope)
    .where('reference_audio.id', id)
    .first()
  return row ?? null
}

export async function findRecordingIdByIsrc(
  connection: Connection,
  isrc: string,
): Promise<RecordingId | null> {
  const row: { id: RecordingId } | undefined = await connection('recordings').where({ isrc }).first('id')
  return row?.id ?? null
}

/** Locks the recording, so that the same file sent twice at once is seen by the second. False when there is none. */
export async function lockRecordingOfAudio(
  trx: Transaction,
  id: RecordingId,
): Promise<{ title: string } | null> {
  const row: { title: string } | undefined = await trx('recordings').where({ id }).forUpdate().first('title')
  return row ?? null
}

export async function findSameAudio(
  connection: Connection,
  recordingId: RecordingId,
  sha256: Buffer,
): Promise<{ fileName: string; uploadedAt: Instant } | null> {
  const row: { fileName: string; uploadedAt: Instant } | undefined = await connection('reference_audio')
    .where({ recording_id: recordingId, sha256 })
    .first({ fileName: 'file_name', uploadedAt: 'uploaded_at' })
  return row ?? null
}

export async function insertReferenceAudio(trx: Transaction, audio: NewReferenceAudio): Promise<void> {
  await trx('reference_audio').insert({
    id: audio.id,
    recording_id: audio.recordingId,
    file_name: audio.fileName,
    size_bytes: audio.sizeBytes,
    sha256: audio.sha256,
    storage_key: audio.storageKey,
    format: audio.format,
    uploaded_by: audio.uploadedBy,
  })
}

export async function lockReferenceAudio(
  trx: Transaction,
  id: ReferenceAudioId,
): Promise<{ status: AudioStatus; fileName: string } | null> {
  const row: { status: AudioStatus; fileName: string } | undefined = await trx('reference_audio')
    .where({ id })
    .forUpdate()
    .first({ status: 'status', fileName: 'file_name' })
  return row ?? null
}

export async function markReferenceAudioWaiting(trx: Transaction, id: ReferenceAudioId): Promise<void> {
  await trx('reference_audio').where({ id }).update({ status: 'waiting', failure: null })
}
