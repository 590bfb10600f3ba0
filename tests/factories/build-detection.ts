import { randomUUID } from 'node:crypto'
import { detectionIdSchema, type DetectionId, type StationLogId } from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'
import type { BuiltRecording } from './build-catalogue.ts'
import { buildPlay, type BuiltPlay } from './build-play.ts'
import type { BuiltStation } from './build-station.ts'

export type DetectionSettings = {
  station: BuiltStation
  recording: BuiltRecording
  logId: StationLogId
  startedAt: string
  seconds?: number
  logStartSeconds?: number
  confidence?: number
  decision?: 'accept' | 'review'
}

export type BuiltDetection = { id: DetectionId; startedAt: string; play: BuiltPlay | null }

/** A detection; an accepted one comes with its counted play, as the engine makes them. */
export async function buildDetection(
  database: Database,
  settings: DetectionSettings,
): Promise<BuiltDetection> {
  const { station, recording, logId, startedAt, seconds = 180, logStartSeconds = 0 } = settings
  const id = detectionIdSchema.parse(randomUUID())
  const decision = settings.decision ?? 'accept'
  await database.raw('select ensure_detections_partition(?)', [startedAt])
  await database('detections').insert({
    id,
    started_at: startedAt,
    ended_at: new Date(Date.parse(startedAt) + seconds * 1000).toISOString(),
    log_id: logId,
    station_id: station.id,
    recording_id: recording.id,
    engine_version: 'test-1',
    log_start_ms: logStartSeconds * 1000,
    log_end_ms: (logStartSeconds + seconds) * 1000,
    reference_start_ms: 2500,
    speed_ratio: 1,
    confidence: settings.confidence ?? 20,
    expected_false_alarms: 1e-20,
    decision,
    agreeing_hashes: 42,
    evidence: JSON.stringify([{ logSeconds: logStartSeconds + 1, referenceSeconds: 3.5 }]),
  })
  const play =
    decision === 'accept'
      ? await buildPlay(database, { station, recording, startedAt, seconds, detectionId: id })
      : null
  return { id, startedAt, play }
}
