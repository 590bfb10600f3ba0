import type { CatalogueImportId } from '@fieldfare/contracts'
import type { Actor, Transaction } from '@fieldfare/database'
import type { HeldRecording, HeldWork } from './catalogue-state.ts'
import type { ImportPlan } from './import-plan.ts'
import type { NewParty } from './plan-parties.ts'
import type { ShareChange } from './plan-shares.ts'
import type { ReportedRow } from './row-report.ts'

/** Few enough parameters for one statement, many enough that twenty thousand rows take seconds. */
const BATCH_ROWS = 1000

const partyColumns = (party: NewParty) => ({
  id: party.id,
  name: party.name,
  ipi: party.ipi,
  ipi_check_ok: party.ipi === null ? null : party.ipiCheckOk,
})
const workColumns = (work: HeldWork) => ({ id: work.id, title: work.title, iswc: work.iswc })
const recordingColumns = (recording: HeldRecording) => ({
  id: recording.id,
  isrc: recording.isrc,
  title: recording.title,
  artist: recording.artist,
  duration_ms: recording.durationMs,
  work_id: recording.workId,
})
const shareColumns = (share: ShareChange) => ({
  id: share.id,
  work_id: share.workId,
  recording_id: share.recordingId,
  party_id: share.partyId,
  share_ppm: share.sharePpm,
  valid_from: share.validFrom,
  valid_to: share.validTo,
})

/** Writes all that a plan changes. Shares that end earlier are changed before those that begin there are added. */
export async function applyImportPlan(trx: Transaction, plan: ImportPlan): Promise<void> {
  await trx.batchInsert('parties', plan.newParties.map(partyColumns), BATCH_ROWS)
  await trx.batchInsert('works', plan.newWorks.map(workColumns), BATCH_ROWS)
  for (const { id, title } of plan.changedWorks) await trx('works').where({ id }).update({ title })
  await trx.batchInsert('recordings', plan.newRecordings.map(recordingColumns), BATCH_ROWS)
  for (const recording of plan.changedRecordings) {
    const { id, ...columns } = recordingColumns(recording)
    await trx('recordings').where({ id }).update(columns)
  }
  for (const { id, sharePpm, validTo } of plan.shares.filter(({ change }) => change === 'updated')) {
    await trx('shares').where({ id }).update({ share_ppm: sharePpm, valid_to: validTo })
  }
  const newShares = plan.shares.filter(({ change }) => change === 'created')
  await trx.batchInsert('shares', newShares.map(shareColumns), BATCH_ROWS)
}

export async function insertImport(
  trx: Transaction,
  actor: Actor,
  fileName: string,
  rows: readonly ReportedRow[],
): Promise<CatalogueImportId> {
  const inserted: { id: CatalogueImportId }[] = await trx('catalogue_imports')
    .insert({ file_name: fileName, imported_by: actor.userId })
    .returning('id')
  const id = inserted[0]?.id
  if (id === undefined) throw new Error('The new import came back without an id')
  await trx.batchInsert(
    'catalogue_import_rows',
    rows.map(({ line, isrc, title, outcome, messages }) => ({
      import_id: id,
      line,
      isrc,
      title,
      outcome,
      messages,
    })),
    BATCH_ROWS,
  )
  return id
}
