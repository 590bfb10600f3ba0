import { createAirtimeClassifier, decodeMono } from '@fieldfare/audio'
import { createLogAnalyser, engineParameters, type CatalogueIndex } from '@fieldfare/fingerprint'
import type { AnalysisOutcome, FoundDetection } from './messages.ts'

export type AnalysisOptions = {
  path: string
  index: CatalogueIndex
  /** Called about once per second of wall-clock time with the seconds of audio that are done. */
  onProgress: (doneSeconds: number) => void
}

const PROGRESS_EVERY_MS = 500

/**
 * Reads a log once, as a stream, and finds what was played and what kind of airtime it was. Memory does not grow with
 * its length.
 *
 * @throws AudioError when the file is not usable audio
 */
export async function analyseAudio(options: AnalysisOptions): Promise<AnalysisOutcome> {
  const { sampleRateHz } = engineParameters
  const audio = decodeMono(options.path, { sampleRateHz })
  const analyser = createLogAnalyser({ index: options.index })
  const classifier = createAirtimeClassifier({ sampleRateHz })
  const detections: FoundDetection[] = []
  const startedAt = performance.now()
  let analyseMs = 0
  let samples = 0
  let reportedAt = startedAt
  for await (const block of audio) {
    const before = performance.now()
    detections.push(...analyser.push(block))
    classifier.push(block)
    samples += block.length
    const now = performance.now()
    analyseMs += now - before
    if (now - reportedAt < PROGRESS_EVERY_MS) continue
    reportedAt = now
    options.onProgress(samples / sampleRateHz)
  }
  const before = performance.now()
  detections.push(...analyser.finish())
  const spans = classifier.finish()
  const now = performance.now()
  analyseMs += now - before
  const summary = audio.summary()
  if (summary === null) throw new Error('The decoder ended without a summary')
  return {
    detections: [...detections].sort(
      (left, right) => left.startSeconds - right.startSeconds || left.recordingNumber - right.recordingNumber,
    ),
    spans: [...spans],
    durationSeconds: summary.samples / sampleRateHz,
    format: summary.format.label,
    isTruncated: summary.isTruncated,
    isSilent: summary.isSilent,
    catalogueRecordings: options.index.recordingCount,
    decodeMs: Math.round(now - startedAt - analyseMs),
    analyseMs: Math.round(analyseMs),
  }
}
