import { decodeMono } from '@fieldfare/audio'
import {
  createLandmarkExtractor,
  encodeFingerprint,
  ENGINE_VERSION,
  engineParameters,
} from '@fieldfare/fingerprint'
import type { FingerprintOutcome } from './messages.ts'

/**
 * Reads reference audio as a stream and gives its landmarks, encoded for storage.
 *
 * @throws AudioError when the file is not usable audio
 */
export async function fingerprintAudio(path: string): Promise<FingerprintOutcome> {
  const { sampleRateHz } = engineParameters
  const audio = decodeMono(path, { sampleRateHz })
  const extractor = createLandmarkExtractor()
  let samples = 0
  for await (const block of audio) {
    extractor.push(block)
    samples += block.length
  }
  extractor.finish()
  const { hashes, frames } = extractor.drain()
  const summary = audio.summary()
  if (summary === null) throw new Error('The decoder ended without a summary')
  const durationSeconds = samples / sampleRateHz
  return {
    landmarks: encodeFingerprint({ engineVersion: ENGINE_VERSION, durationSeconds, hashes, frames }),
    landmarkHashes: hashes.length,
    durationSeconds,
    format: summary.format.label,
    isSilent: summary.isSilent,
  }
}
