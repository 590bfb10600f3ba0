import type { RecordingId, ReferenceAudioId } from '@fieldfare/contracts'
import type { Connection, Database, Transaction } from '../connection.ts'
import { enqueueJob } from '../jobs/job.repository.ts'

export type ReferenceToFingerprint = {
  id: ReferenceAudioId
  recordingId: RecordingId
  storageKey: string
  fileName: string
}

export async function findReferenceToFingerprint(
  connection: Connection,
  id: ReferenceAudioId,
): Promise<ReferenceToFingerprint | null> {
  const row: ReferenceToFingerprint | undefined = await connection('reference_audio')
    .where({ id })
    .first({ id: 'id', recordingId: 'recording_id', storageKey: 'storage_key', fileName: 'file_name' })
  return row ?? null
}

export async function markReferenceFingerprinting(
  connection: Connection,
  id: ReferenceAudioId,
): Promise<void> {
  await connection('reference_audio').where({ id }).update({ status: 'fingerprinting', failure: null })
}

export type NewFingerprint = {
  reference: ReferenceToFingerprint
  engineVersion: string
  landmarks: Uint8Array
  landmarkHashes: number
  format: string
  durationMs: number
}

/** Stores a fingerprint and marks its reference audio as ready. Storing the same one again changes nothing. */
export async function saveFingerprint(trx: Transaction, fingerprint: NewFingerprint): Promise<void> {
  const { reference, durationMs } = fingerprint
  // Workers ask for what came after the last sequence number they saw. Numbers are given out before transactions
  // commit: taking turns until the commit keeps a lower one from appearing after a higher one was seen.
  await trx.raw("select pg_advisory_xact_lock(hashtext('fingerprints_sequence'))")
  await trx('fingerprints')
    .insert({
      reference_audio_id: reference.id,
      recording_id: reference.recordingId,
      engine_version: fingerprint.engineVersion,
      landmarks: Buffer.from(fingerprint.landmarks),
    })
    .onConflict(['reference_audio_id', 'engine_version'])
    .ignore()
  await trx('reference_audio').where({ id: reference.id }).update({
    status: 'ready',
    failure: null,
    format: fingerprint.format,
    duration_ms: durationMs,
    landmark_hashes: fingerprint.landmarkHashes,
  })
  await trx('recordings')
    .where({ id: reference.recordingId })
    .whereNull('duration_ms')
    .update({ duration_ms: durationMs })
}

/** @param reason - in words for the person who sent the file */
export async function markReferenceFailed(
  connection: Connection,
  id: ReferenceAudioId,
  reason: string,
): Promise<void> {
  await connection('reference_audio').where({ id }).update({ status: 'failed', failure: reason })
}

export type StoredFingerprint = { sequence: bigint; recordingNumber: number; landmarks: Uint8Array }

/** Fingerprints of an engine version that came after a sequence number, in order. */
export async function listFingerprintsAfter(
  database: Database,
  engineVersion: string,
  sequence: bigint,
  count: number,
): Promise<StoredFingerprint[]> {
  return database('fingerprints as f')
    .join('recordings as r', 'r.id', 'f.recording_id')
    .where('f.engine_version', engineVersion)
    .where('f.sequence', '>', sequence.toString())
    .orderBy('f.sequence')
    .limit(count)
    .select<StoredFingerprint[]>({
      sequence: 'f.sequence',
      recordingNumber: 'r.recording_number',
      landmarks: 'f.landmarks',
    })
}

/** Asks for the fingerprints that a new engine version does not have yet. Asking again adds nothing. */
export async function enqueueMissingFingerprints(trx: Transaction, engineVersion: string): Promise<number> {
  const missing: { id: ReferenceAudioId }[] = await trx('reference_audio as a')
    .where('a.status', 'ready')
    .whereNotExists(
      trx('fingerprints as f')
        .whereRaw('f.reference_audio_id = a.id')
        .where('f.engine_version', engineVersion)
        .select(trx.raw('1')),
    )
    .select({ id: 'a.id' })
  for (const { id } of missing) {
    await enqueueJob(trx, {
      kind: 'fingerprint-reference',
      payload: { referenceAudioId: id },
      dedupeKey: `fingerprint-reference-${id}-engine-${engineVersion}`,
    })
  }
  return missing.length
}
