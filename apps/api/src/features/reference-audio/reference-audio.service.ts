import { randomUUID } from 'node:crypto'
import {
  formatIsrc,
  referenceAudioIdSchema,
  type RecordingId,
  type ReferenceAudioId,
} from '@fieldfare/contracts'
import {
  enqueueJob,
  inTransaction,
  recordAudit,
  type Actor,
  type Database,
  type ObjectStorage,
  type Scope,
  type Transaction,
} from '@fieldfare/database'
import { checkAudioUpload, fileRefused, type CheckedAudio } from '../../audio-uploads/check-audio-upload.ts'
import { keepUpload } from '../../audio-uploads/keep-upload.ts'
import { conflict, fieldRefused, notFound } from '../../http/app-error.ts'
import type { UploadedFile } from '../../http/upload.ts'
import { nextDedupeKey } from '../../jobs/numbered-job.repository.ts'
import { isrcInFileName } from './isrc-in-file-name.ts'
import {
  findRecordingIdByIsrc,
  findReferenceAudio,
  findSameAudio,
  insertReferenceAudio,
  listReferenceAudioInScope,
  lockRecordingOfAudio,
  lockReferenceAudio,
  markReferenceAudioWaiting,
  type ReferenceAudioFilter,
  type ReferenceAudioRecord,
} from './reference-audio.repository.ts'

type Upload = {
  id: ReferenceAudioId
  recordingId: RecordingId
  storageKey: string
  file: UploadedFile
} & CheckedAudio

const stemOf = (id: ReferenceAudioId) => `fingerprint-reference-${id}`

async function recordingOfFileName(database: Database, fileName: string): Promise<RecordingId> {
  const isrc = isrcInFileName(fileName)
  if (isrc === null) {
    throw fileRefused(
      `No ISRC stands in the file name “${fileName}”. Name the recording, or rename the file.`,
    )
  }
  const recordingId = await findRecordingIdByIsrc(database, isrc)
  if (recordingId === null) {
    throw fileRefused(
      `The file name “${fileName}” names ISRC ${formatIsrc(isrc)}, which is no recording of the catalogue. Add the recording first.`,
    )
  }
  return recordingId
}

async function recordUpload(trx: Transaction, actor: Actor, upload: Upload): Promise<void> {
  const { id, recordingId, file } = upload
  const recording = await lockRecordingOfAudio(trx, recordingId)
  if (recording === null) throw fieldRefused('recordingId', 'This recording does not exist.')
  const same = await findSameAudio(trx, recordingId, upload.sha256)
  if (same !== null) {
    throw conflict(
      `“${recording.title}” has this very audio already: ${same.fileName}, sent on ${same.uploadedAt.slice(0, 10)}.`,
    )
  }
  await insertReferenceAudio(trx, {
    id,
    recordingId,
    fileName: file.originalName,
    sizeBytes: file.sizeBytes,
    sha256: upload.sha256,
    storageKey: upload.storageKey,
    format: upload.format,
    uploadedBy: actor.userId,
  })
  await enqueueJob(trx, {
    kind: 'fingerprint-reference',
    payload: { referenceAudioId: id },
    dedupeKey: `${stemOf(id)}-1`,
  })
  await recordAudit(trx, {
    actor,
    action: 'upload-reference-audio',
    subjectKind: 'recording',
    subjectId: recordingId,
    summary: `Sent reference audio for “${recording.title}”: ${upload.format}, ${file.sizeBytes} bytes.`,
  })
}

export function createReferenceAudioService({
  database,
  storage,
}: {
  database: Database
  storage: ObjectStorage
}) {
  async function demand(scope: Scope, id: ReferenceAudioId): Promise<ReferenceAudioRecord> {
    const audio = await findReferenceAudio(database, scope, id)
    if (audio === null) throw notFound('This reference audio')
    return audio
  }

  async function upload(
    actor: Actor,
    scope: Scope,
    file: UploadedFile,
    givenRecordingId: RecordingId | undefined,
  ): Promise<ReferenceAudioRecord> {
    const audio = await checkAudioUpload(file)
    const recordingId = givenRecordingId ?? (await recordingOfFileName(database, file.originalName))
    const id = referenceAudioIdSchema.parse(randomUUID())
    const storageKey = `reference-audio/${id}`
    await keepUpload(storage, storageKey, file, () =>
      inTransaction(database, (trx) =>
        recordUpload(trx, actor, { id, recordingId, storageKey, file, ...audio }),
      ),
    )
    return demand(scope, id)
  }

  async function retry(actor: Actor, scope: Scope, id: ReferenceAudioId): Promise<ReferenceAudioRecord> {
    await inTransaction(database, async (trx) => {
      const audio = await lockReferenceAudio(trx, id)
      if (audio === null) throw notFound('This reference audio')
      if (audio.status !== 'failed')
        throw conflict('Only reference audio that failed can be fingerprinted again.')
      await markReferenceAudioWaiting(trx, id)
      const dedupeKey = await nextDedupeKey(trx, stemOf(id))
      await enqueueJob(trx, { kind: 'fingerprint-reference', payload: { referenceAudioId: id }, dedupeKey })
      await recordAudit(trx, {
        actor,
        action: 'retry-reference-audio',
        subjectKind: 'reference-audio',
        subjectId: id,
        summary: `Asked to fingerprint ${audio.fileName} again.`,
      })
    })
    return demand(scope, id)
  }

  return {
    list: (scope: Scope, filter: ReferenceAudioFilter) => listReferenceAudioInScope(database, scope, filter),
    upload,
    retry,
  }
}
