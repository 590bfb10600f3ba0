import { playIdSchema, type DetectionId, type PlayId } from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'
import type { BuiltRecording } from './build-catalogue.ts'
import type { BuiltStation } from './build-station.ts'
import { inserted } from './unique.ts'

export type PlaySettings = {
  station: BuiltStation
  recording: BuiltRecording
  startedAt: string
  seconds?: number
  detectionId?: DetectionId
  status?: 'counted' | 'removed'
}

export type BuiltPlay = { id: PlayId; localDay: string }

/** A play, dated in the zone of its station, with the event that made it. */
export async function buildPlay(database: Database, settings: PlaySettings): Promise<BuiltPlay> {
  const { station, recording, startedAt, seconds = 180, detectionId } = settings
  const rows: { id: string; localDay: string }[] = await database('plays')
    .insert({
      station_id: station.id,
      recording_id: recording.id,
      started_at: startedAt,
      ended_at: new Date(Date.parse(startedAt) + seconds * 1000).toISOString(),
      local_day: database.raw('(?::timestamptz at time zone ?)::date', [startedAt, station.timeZone]),
      status: settings.status ?? 'counted',
      ...(detectionId === undefined ? {} : { detection_id: detectionId, detection_started_at: startedAt }),
    })
    .returning(['id', 'local_day as localDay'])
  const { id, localDay } = inserted(rows)
  await database('play_events').insert({ play_id: id, kind: 'created', actor_name: 'Engine' })
  return { id: playIdSchema.parse(id), localDay }
}
