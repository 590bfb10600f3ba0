import {
  findReferenceToFingerprint,
  markReferenceFailed,
  markReferenceFingerprinting,
  saveFingerprint,
} from '@fieldfare/database'
import { ENGINE_VERSION } from '@fieldfare/fingerprint'
import { UnusableAudio } from '../engine/thread-pool.ts'
import { JobRefused, type JobHandler } from './job-context.ts'

/** Below this a reference says too little to be told from chance. */
const SHORTEST_SECONDS = 3

/** Reads reference audio and stores its landmarks. */
export const fingerprintReferenceJob: JobHandler<'fingerprint-reference'> = {
  async run(context, { referenceAudioId }) {
    const { database, storage, threads, signal, tell, finish } = context
    const reference = await findReferenceToFingerprint(database, referenceAudioId)
    if (reference === null) throw new JobRefused('The reference audio is no longer there.')
    const event = {
      kind: 'reference-progress',
      referenceAudioId,
      recordingId: reference.recordingId,
    } as const
    await markReferenceFingerprinting(database, reference.id)
    await tell({ ...event, status: 'fingerprinting', fraction: null })
    const outcome = await storage
      .withLocalFile(reference.storageKey, (path) => threads.fingerprint(path, signal))
      .catch((error: unknown) => {
        throw error instanceof UnusableAudio ? new JobRefused(error.userMessage, { cause: error }) : error
      })
    if (outcome.isSilent) throw new JobRefused('The file is silent from beginning to end.')
    if (outcome.durationSeconds < SHORTEST_SECONDS)
      throw new JobRefused(
        `The file is shorter than ${SHORTEST_SECONDS} seconds, too little to be recognised by.`,
      )
    if (outcome.landmarkHashes === 0)
      throw new JobRefused('Nothing in this sound stands out enough to be recognised by.')
    await finish((trx) =>
      saveFingerprint(trx, {
        reference,
        engineVersion: ENGINE_VERSION,
        landmarks: outcome.landmarks,
        landmarkHashes: outcome.landmarkHashes,
        format: outcome.format,
        durationMs: Math.round(outcome.durationSeconds * 1000),
      }),
    )
    await tell({ ...event, status: 'ready', fraction: 1 })
  },
  onFailure: (trx, { referenceAudioId }, reason) => markReferenceFailed(trx, referenceAudioId, reason),
}
