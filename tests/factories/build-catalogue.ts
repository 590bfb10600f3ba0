import {
  partyIdSchema,
  recordingIdSchema,
  workIdSchema,
  type PartyId,
  type RecordingId,
  type WorkId,
} from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'
import { inserted, nextNumber } from './unique.ts'

export type BuiltParty = { id: PartyId; name: string }

export async function buildParty(database: Database, name?: string): Promise<BuiltParty> {
  const party = { name: name ?? `Party ${nextNumber()}` }
  const rows: { id: string }[] = await database('parties').insert(party).returning('id')
  return { id: partyIdSchema.parse(inserted(rows).id), ...party }
}

export async function buildWork(database: Database, title?: string): Promise<WorkId> {
  const rows: { id: string }[] = await database('works')
    .insert({ title: title ?? `Work ${nextNumber()}` })
    .returning('id')
  return workIdSchema.parse(inserted(rows).id)
}

export type BuiltShare = {
  party: BuiltParty
  sharePpm?: number
  validFrom?: string
  validTo?: string | null
}

export type RecordingSettings = {
  title?: string
  artist?: string
  workId?: WorkId
  shares?: readonly BuiltShare[]
}

export type BuiltRecording = { id: RecordingId; isrc: string; title: string; artist: string }

export async function buildRecording(
  database: Database,
  settings: RecordingSettings = {},
): Promise<BuiltRecording> {
  const number = nextNumber()
  const recording = {
    isrc: `ZZTST26${String(number).padStart(5, '0')}`,
    title: settings.title ?? `Tune ${number}`,
    artist: settings.artist ?? `Band ${number}`,
  }
  const rows: { id: string }[] = await database('recordings')
    .insert({ ...recording, work_id: settings.workId ?? null })
    .returning('id')
  const id = recordingIdSchema.parse(inserted(rows).id)
  for (const share of settings.shares ?? []) await buildShare(database, { recordingId: id }, share)
  return { id, ...recording }
}

export async function buildShare(
  database: Database,
  subject: { recordingId: RecordingId } | { workId: WorkId },
  share: BuiltShare,
): Promise<void> {
  await database('shares').insert({
    ...('workId' in subject ? { work_id: subject.workId } : { recording_id: subject.recordingId }),
    party_id: share.party.id,
    share_ppm: share.sharePpm ?? 1_000_000,
    valid_from: share.validFrom ?? '2020-01-01',
    valid_to: share.validTo ?? null,
  })
}
