import { formatIsrc, type RecordingId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  violates,
  type Actor,
  type Database,
  type Scope,
} from '@fieldfare/database'
import { fieldRefused, notFound } from '../../http/app-error.ts'
import { describeChanges } from './field-changes.ts'
import {
  findRecording,
  findRecordingByIsrc,
  insertRecording,
  listRecordingsInScope,
  lockRecording,
  updateRecordingDetails,
  type RecordingDetails,
  type RecordingFilter,
  type RecordingRecord,
} from './recordings.repository.ts'
import { setShares, type SharesInput } from './set-shares.ts'
import { takenCode } from './taken-code.ts'

export function createRecordingsService({ database }: { database: Database }) {
  async function demand(scope: Scope, id: RecordingId): Promise<RecordingRecord> {
    const recording = await findRecording(database, scope, id)
    if (recording === null) throw notFound('This recording')
    return recording
  }

  async function refuse(error: unknown, isrc: string): Promise<never> {
    if (violates(error, 'recordings_work_fkey')) throw fieldRefused('workId', 'This work does not exist.')
    if (!violates(error, 'recordings_isrc_key')) throw error
    const holder = await findRecordingByIsrc(database, isrc)
    throw takenCode(
      'isrc',
      formatIsrc(isrc),
      holder === null ? null : `“${holder.title}” by ${holder.artist}`,
    )
  }

  async function create(actor: Actor, details: RecordingDetails): Promise<RecordingRecord> {
    const id = await inTransaction(database, async (trx) => {
      const recordingId = await insertRecording(trx, details)
      await recordAudit(trx, {
        actor,
        action: 'create-recording',
        subjectKind: 'recording',
        subjectId: recordingId,
        summary: `Added the recording “${details.title}” by ${details.artist}, ${details.isrc}.`,
      })
      return recordingId
    }).catch((error: unknown) => refuse(error, details.isrc))
    return demand({ kind: 'all' }, id)
  }

  async function update(actor: Actor, id: RecordingId, details: RecordingDetails): Promise<RecordingRecord> {
    await inTransaction(database, async (trx) => {
      const before = await lockRecording(trx, id)
      if (before === null) throw notFound('This recording')
      const changes = describeChanges([
        { label: 'ISRC', before: before.isrc, after: details.isrc },
        { label: 'title', before: before.title, after: details.title },
        { label: 'artist', before: before.artist, after: details.artist },
        { label: 'seconds', before: before.durationSeconds, after: details.durationSeconds },
        { label: 'work', before: before.workId, after: details.workId },
      ])
      if (changes === '') return
      await updateRecordingDetails(trx, id, details)
      await recordAudit(trx, {
        actor,
        action: 'update-recording',
        subjectKind: 'recording',
        subjectId: id,
        summary: `Changed the recording “${before.title}”: ${changes}.`,
      })
    }).catch((error: unknown) => refuse(error, details.isrc))
    return demand({ kind: 'all' }, id)
  }

  async function replaceShares(actor: Actor, id: RecordingId, input: SharesInput): Promise<RecordingRecord> {
    await setShares(database, actor, { kind: 'recording', id }, input, async (trx) => {
      const recording = await lockRecording(trx, id)
      if (recording === null) throw notFound('This recording')
      return `the recording “${recording.title}”`
    })
    return demand({ kind: 'all' }, id)
  }

  return {
    list: (scope: Scope, filter: RecordingFilter) => listRecordingsInScope(database, scope, filter),
    get: demand,
    create,
    update,
    replaceShares,
  }
}
