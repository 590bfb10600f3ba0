import { setTimeout as pause } from 'node:timers/promises'
import type { ClipSource, DetectionId } from '@fieldfare/contracts'
import { clipFileName, clipStorageKey, inTransaction, type Scope } from '@fieldfare/database'
import { AppError, fieldRefused, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { storedFile, type FileAnswer } from '../../http/file-answer.ts'
import { askAgain, readJobOutcome } from '../../records/job-retry.repository.ts'
import { findDetection, type DetectionEvidenceRow } from './detections.repository.ts'

export type ClipRequest = { detectionId: DetectionId; source: ClipSource; fromSeconds: number }

const WAIT_MS = 20_000
const POLL_MS = 200

function refuseWithoutAudio(detection: DetectionEvidenceRow, source: ClipSource): void {
  if (source === 'log' && !detection.isLogAudioKept) {
    throw new AppError('audio-expired', { detail: 'The audio of this station log is no longer kept.' })
  }
  if (source === 'reference' && !detection.hasReferenceAudio) {
    throw new AppError('audio-expired', { detail: 'No reference audio of this recording is kept.' })
  }
}

/** Waits for the worker; a viewer who leaves ends the waiting, not the work. */
async function waitForClip(
  dependencies: Dependencies,
  clip: ClipRequest,
  signal: AbortSignal,
): Promise<void> {
  const { database, storage } = dependencies
  const jobId = await inTransaction(database, (trx) =>
    askAgain(trx, { kind: 'cut-clip', payload: clip, dedupeKey: `cut-clip-${clipFileName(clip)}` }),
  )
  const deadline = performance.now() + WAIT_MS
  while (performance.now() < deadline && !signal.aborted) {
    const job = await readJobOutcome(database, jobId)
    if (job?.status === 'failed') {
      throw new AppError('unavailable', {
        detail: `The clip could not be made. ${job.errorMessage ?? ''}`.trim(),
      })
    }
    if (job?.status === 'done' && (await storage.stat(clipStorageKey(clip))) !== null) return
    await pause(POLL_MS)
  }
  throw new AppError('unavailable', {
    detail: 'The clip is still being made. Try again in a moment.',
    retryAfterSeconds: 10,
  })
}

/** A clip to listen to: from storage, or cut now where it is asked for the first time. */
export async function provideClip(
  dependencies: Dependencies,
  scope: Scope,
  clip: ClipRequest,
  signal: AbortSignal,
): Promise<FileAnswer> {
  const { database, storage } = dependencies
  const detection = await findDetection(database, scope, clip.detectionId)
  if (detection === null) throw notFound('This detection')
  if (clip.fromSeconds >= detection.durationSeconds) {
    throw fieldRefused('fromSeconds', 'The clip would begin after the end of the detection.')
  }
  const key = clipStorageKey(clip)
  if ((await storage.stat(key)) === null) {
    refuseWithoutAudio(detection, clip.source)
    await waitForClip(dependencies, clip, signal)
  }
  return storedFile({
    mediaType: 'audio/mpeg',
    fileName: `${clip.source}-${clip.fromSeconds}s.mp3`,
    disposition: 'inline',
    storage,
    key,
  })
}
