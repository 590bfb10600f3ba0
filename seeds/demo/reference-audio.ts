import { createHash } from 'node:crypto'
import { createReadStream } from 'node:fs'
import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { pipeline } from 'node:stream/promises'
import { composeTune, renderTune, writeAudioFile, type EncodingFormat } from '@fieldfare/audio'
import { referenceAudioIdSchema } from '@fieldfare/contracts'
import { enqueueJob, inTransaction, type Database, type ObjectStorage } from '@fieldfare/database'
import type { DemoRecording } from './catalogue.ts'

export const SAMPLE_RATE = 22_050

/** References arrive in all the formats that are taken; FLAC mostly, since it loses nothing and is quick. */
const formats: readonly EncodingFormat[] = [
  'flac',
  'flac',
  'mp3',
  'flac',
  'ogg',
  'flac',
  'wav',
  'flac',
  'm4a',
  'opus',
]

async function sha256Of(path: string): Promise<Buffer> {
  const hash = createHash('sha256')
  await pipeline(createReadStream(path), hash)
  return hash.digest()
}

/**
 * Renders the tune of every recording, stores it as reference audio and asks the worker for its fingerprint.
 *
 * @returns the length of each recording in milliseconds, by id
 */
export async function addReferenceAudio(options: {
  database: Database
  storage: ObjectStorage
  recordings: readonly DemoRecording[]
  uploadedBy: string
  directory: string
  onProgress: (done: number) => void
}): Promise<Map<string, number>> {
  const { database, storage, recordings, uploadedBy, directory } = options
  const lengthsMs = new Map<string, number>()
  for (const [n, recording] of recordings.entries()) {
    const samples = renderTune(composeTune(recording.tuneSeed), SAMPLE_RATE)
    lengthsMs.set(recording.id, Math.round((samples.length / SAMPLE_RATE) * 1000))
    const format = formats[n % formats.length] ?? 'flac'
    const filePath = join(directory, `${recording.isrc}.${format}`)
    await writeAudioFile(filePath, samples, SAMPLE_RATE, { format })
    const sha256 = await sha256Of(filePath)
    await inTransaction(database, async (trx) => {
      const rows: { id: string }[] = await trx('reference_audio')
        .insert({
          recording_id: recording.id,
          file_name: `${recording.isrc}.${format}`,
          size_bytes: 1,
          sha256,
          storage_key: `reference-audio/${recording.id}`,
          uploaded_by: uploadedBy,
        })
        .returning('id')
      const id = referenceAudioIdSchema.parse(rows[0]?.id)
      const { sizeBytes } = await storage.put(`reference-audio/${id}`, { filePath })
      await trx('reference_audio')
        .where({ id })
        .update({ size_bytes: sizeBytes, storage_key: `reference-audio/${id}` })
      await enqueueJob(trx, {
        kind: 'fingerprint-reference',
        payload: { referenceAudioId: id },
        dedupeKey: `fingerprint-reference-${id}-1`,
      })
    })
    await rm(filePath)
    options.onProgress(n + 1)
  }
  return lengthsMs
}
