import { randomBytes } from 'node:crypto'
import { stationLogIdSchema, type StationLogId } from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'
import type { BuiltStation } from './build-station.ts'
import { inserted } from './unique.ts'

export type LogSettings = {
  station: BuiltStation
  startedAt: string
  seconds?: number
  status?: 'queued' | 'analysing' | 'analysed' | 'rejected' | 'failed'
  /** Stretches of music in seconds from the start. */
  music?: readonly (readonly [from: number, to: number])[]
  isAudioKept?: boolean
}

/** A log whose airtime is known unless it still waits to be read; uploaded by a user made for it. */
export async function buildLog(database: Database, settings: LogSettings): Promise<StationLogId> {
  const { station, startedAt, seconds = 3600, status = 'analysed', music = [] } = settings
  const sha256 = randomBytes(32)
  const key = sha256.toString('hex')
  const users: { id: string }[] = await database('users')
    .insert({ email: `log-${key}@example.org`, name: 'Log owner', role: 'uploader', status: 'invited' })
    .returning('id')
  const endedAt = new Date(Date.parse(startedAt) + seconds * 1000).toISOString()
  const isRead = status === 'analysed' || status === 'failed'
  const isRefused = status === 'rejected' || status === 'failed'
  const musicMs = music.reduce((sum, [from, to]) => sum + (to - from) * 1000, 0)
  const rows: { id: string }[] = await database('station_logs')
    .insert({
      station_id: station.id,
      file_name: 'log.mp3',
      size_bytes: 1000,
      sha256,
      storage_key: settings.isAudioKept === false ? null : `logs/${key}`,
      started_at: startedAt,
      duration_ms: isRead ? seconds * 1000 : null,
      airtime: isRead ? `[${startedAt},${endedAt})` : null,
      status,
      failure_code: isRefused ? 'unreadable' : null,
      failure_message: isRefused ? 'It cannot be read.' : null,
      uploaded_by: inserted(users).id,
      ...(status === 'analysed'
        ? {
            analysed_at: endedAt,
            music_ms: musicMs,
            speech_ms: seconds * 1000 - musicMs,
            silence_ms: 0,
          }
        : {}),
    })
    .returning('id')
  const id = stationLogIdSchema.parse(inserted(rows).id)
  for (const [from, to] of music) {
    await database('log_spans').insert({
      log_id: id,
      start_ms: from * 1000,
      end_ms: to * 1000,
      kind: 'music',
    })
  }
  return id
}
