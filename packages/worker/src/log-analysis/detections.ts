import { detectionIdSchema, type StationLogId } from '@fieldfare/contracts'
import type { NewDetection } from '@fieldfare/database'
import { v5 as uuidV5 } from 'uuid'
import type { FoundDetection } from '../engine/messages.ts'

/** Pairs stored with a detection; enough to draw the alignment. */
const EVIDENCE_DIGITS = 3

function milliseconds(seconds: number): number {
  return Math.max(0, Math.round(seconds * 1000))
}

function rounded(seconds: number): number {
  return Number(seconds.toFixed(EVIDENCE_DIGITS))
}

/**
 * Rows for what the engine found in a log. The id follows from log, engine, recording and start, so that the same
 * run, however often repeated, names the same detections. Where one recording follows itself without a pause the
 * second begins where the first ends.
 *
 * @param found - in order of start
 */
export function describeDetections(
  log: { id: StationLogId; startedAt: Date },
  engineVersion: string,
  found: readonly FoundDetection[],
): NewDetection[] {
  const lastEnds = new Map<number, number>()
  const rows: NewDetection[] = []
  for (const detection of found) {
    const { recordingNumber } = detection
    const foundStartMs = milliseconds(detection.startSeconds)
    const logStartMs = Math.max(foundStartMs, lastEnds.get(recordingNumber) ?? 0)
    const logEndMs = milliseconds(detection.endSeconds)
    if (logEndMs <= logStartMs) continue
    lastEnds.set(recordingNumber, logEndMs)
    const name = `${log.id}/${engineVersion}/${recordingNumber}/${foundStartMs}`
    rows.push({
      id: detectionIdSchema.parse(uuidV5(name, log.id)),
      recordingNumber,
      startedAt: new Date(log.startedAt.getTime() + logStartMs),
      endedAt: new Date(log.startedAt.getTime() + logEndMs),
      logStartMs,
      logEndMs,
      referenceStartMs:
        milliseconds(detection.referenceStartSeconds) +
        Math.round((logStartMs - foundStartMs) * detection.speedRatio),
      speedRatio: detection.speedRatio,
      confidence: Math.max(0, detection.confidence),
      expectedFalseAlarms: detection.expectedFalseAlarms,
      decision: detection.decision,
      agreeingHashes: detection.agreeingHashes,
      evidence: detection.evidence.map((pair) => ({
        logSeconds: rounded(pair.logSeconds),
        referenceSeconds: rounded(pair.referenceSeconds),
      })),
    })
  }
  return rows
}
