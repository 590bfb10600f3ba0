import {
  partyIdSchema,
  readIpi,
  recordingIdSchema,
  workIdSchema,
  type PartyId,
  type RecordingId,
} from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'
import type { CataloguePlan, SharePlan } from './catalogue-plan.ts'
import type { DemoMonths } from './months.ts'

export type DemoRecording = { id: RecordingId; isrc: string; tuneSeed: number }
export type DemoCatalogue = { partyIds: ReadonlyMap<string, PartyId>; recordings: DemoRecording[] }

async function insertParties(database: Database, plan: CataloguePlan): Promise<Map<string, PartyId>> {
  const ids = new Map<string, PartyId>()
  for (const { key, name, ipi } of plan.parties) {
    const reading = ipi === null ? null : readIpi(ipi)
    const rows: { id: string }[] = await database('parties')
      .insert({ name, ipi, ipi_check_ok: reading?.ok ? reading.checkOk : null })
      .returning('id')
    ids.set(key, partyIdSchema.parse(rows[0]?.id))
  }
  return ids
}

/** Writes the planned catalogue; audio and fingerprints come later, through the worker. */
export async function insertCatalogue(
  database: Database,
  plan: CataloguePlan,
  months: DemoMonths,
): Promise<DemoCatalogue> {
  const partyIds = await insertParties(database, plan)
  const shareRows = (shares: readonly SharePlan[], subject: object) =>
    shares.map(({ partyKey, sharePpm, validFromMonthsAgo }) => ({
      ...subject,
      party_id: partyIds.get(partyKey),
      share_ppm: sharePpm,
      valid_from: months.current.minus({ months: validFromMonthsAgo }).toISODate(),
    }))
  const workShares: object[] = []
  const recordingShares: object[] = []
  const workIds: string[] = []
  for (const work of plan.works) {
    const rows: { id: string }[] = await database('works')
      .insert({ title: work.title, creators: work.creators, iswc: work.iswc })
      .returning('id')
    const id = workIdSchema.parse(rows[0]?.id)
    workIds.push(id)
    workShares.push(...shareRows(work.shares, { work_id: id }))
  }
  const recordings: DemoRecording[] = []
  for (const recording of plan.recordings) {
    const rows: { id: string }[] = await database('recordings')
      .insert({
        isrc: recording.isrc,
        title: recording.title,
        artist: recording.artist,
        work_id: recording.workIndex === null ? null : workIds[recording.workIndex],
      })
      .returning('id')
    const id = recordingIdSchema.parse(rows[0]?.id)
    recordings.push({ id, isrc: recording.isrc, tuneSeed: recording.tuneSeed })
    recordingShares.push(...shareRows(recording.shares, { recording_id: id }))
  }
  await database.batchInsert('shares', workShares)
  await database.batchInsert('shares', recordingShares)
  return { partyIds, recordings }
}
