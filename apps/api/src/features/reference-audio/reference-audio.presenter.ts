import type { EndpointResult, uploadReferenceAudio } from '@fieldfare/contracts'
import type { ReferenceAudioRecord } from './reference-audio.repository.ts'

export function presentReferenceAudio(
  audio: ReferenceAudioRecord,
): EndpointResult<typeof uploadReferenceAudio> {
  const { id, isrc, title, artist } = audio.recording
  return {
    id: audio.id,
    recording: { id, isrc, title, artist },
    fileName: audio.fileName,
    sizeBytes: audio.sizeBytes,
    format: audio.format,
    durationSeconds: audio.durationSeconds,
    status: audio.status,
    failure: audio.failure,
    landmarkHashes: audio.landmarkHashes,
    uploadedAt: audio.uploadedAt,
    uploadedByName: audio.uploadedByName,
  }
}
