import { randomBytes, randomInt, randomUUID } from 'node:crypto'
import {
  detectionIdSchema,
  partyIdSchema,
  playIdSchema,
  recordingIdSchema,
  stationIdSchema,
  stationLogIdSchema,
  workIdSchema,
  type DetectionId,
  type PartyId,
  type RecordingId,
  type StationId,
  type StationLogId,
  type WorkId,
} from '@fieldfare/contracts'
import type { Database } from '@fieldfare/database'

/** Rows that tests need to be there, written straight into the database. */
export async function addStation(database: Database, timeZone = 'Europe/Lisbon'): Promise<StationId> {
  const id = stationIdSchema.parse(randomUUID())
  const callName = `T-${randomBytes(4).toString('hex').toUpperCase()}`
  await database('stations').insert({
    id,
    call_name: callName,
    name: `Station ${callName}`,
    time_zone: timeZone,
  })
  return id
}

export async function addParty(database: Database, name = `Party ${randomUUID()}`): Promise<PartyId> {
  const id = partyIdSchema.parse(randomUUID())
  await database('parties').insert({ id, name })
  return id
}

export async function addWork(database: Database, title = `Work ${randomUUID()}`): Promise<WorkId> {
  const id = workIdSchema.parse(randomUUID())
  await database('works').insert({ id, title })
  return id
}

export function anyIsrc(): string {
  return `ZZXXX${randomInt(10_000_000).toString().padStart(7, '0')}`
}

export async function addRecording(
  database: Database,
  details: { isrc?: string; title?: string; artist?: string; workId?: WorkId } = {},
): Promise<RecordingId> {
  const id = recordingIdSchema.parse(randomUUID())
  await database('recordings').insert({
    id,
    isrc: details.isrc ?? anyIsrc(),
    title: details.title ?? `Recording ${id}`,
    artist: details.artist ?? 'The Fixtures',
    work_id: details.workId ?? null,
  })
  return id
}

export async function addShare(
  database: Database,
  partyId: PartyId,
  subject: { workId: WorkId } | { recordingId: RecordingId },
  sharePpm = 1_000_000,
): Promise<void> {
  await database('shares').insert({
    party_id: partyId,
    ...('workId' in subject ? { work_id: subject.workId } : { recording_id: subject.recordingId }),
    share_ppm: sharePpm,
    valid_from: '2020-01-01',
  })
}

type LogDetails = { stationId: StationId; startedAt: string; seconds: number; status?: string }

/** A log that was analysed, its whole length held. */
export async function addLog(
  database: Database,
  { stationId, startedAt, seconds, status = 'analysed' }: LogDetails,
): Promise<StationLogId> {
  const id = stationLogIdSchema.parse(randomUUID())
  const [user] = await database('users').limit(1).select<{ id: string }[]>('id')
  const isFailure = status === 'failed' || status === 'rejected'
  await database('station_logs').insert({
    id,
    station_id: stationId,
    file_name: `log-${id}.wav`,
    size_bytes: 1000,
    sha256: randomBytes(32),
    storage_key: `logs/${id}`,
    started_at: startedAt,
    duration_ms: seconds * 1000,
    airtime: isFailure
      ? null
      : database.raw("tstzrange(?, ?::timestamptz + ? * interval '1 second')", [
          startedAt,
          startedAt,
          seconds,
        ]),
    status,
    failure_code: isFailure ? 'test' : null,
    failure_message: isFailure ? 'Made to fail.' : null,
    music_ms: 0,
    speech_ms: 0,
    silence_ms: 0,
    analysed_at: startedAt,
    uploaded_by: user?.id,
  })
  return id
}

export async function addHeard(
  database: Database,
  logId: StationLogId,
  spans: readonly { kind: 'music' | 'speech' | 'silence'; from: number; to: number }[],
): Promise<void> {
  await database('log_spans').insert(
    spans.map(({ kind, from, to }) => ({ log_id: logId, kind, start_ms: from * 1000, end_ms: to * 1000 })),
  )
}

type Found = {
  stationId: StationId
  logId: StationLogId
  recordingId: RecordingId
  logStartedAt: string
  from: number
  to: number
}

const momentOf = (found: Found, seconds: number) =>
  new Date(Date.parse(found.logStartedAt) + seconds * 1000).toISOString()

export async function addDetection(
  database: Database,
  found: Found,
  decision: 'accept' | 'review',
): Promise<DetectionId> {
  const id = detectionIdSchema.parse(randomUUID())
  await database.raw('select ensure_detections_partition(?)', [momentOf(found, found.from)])
  await database('detections').insert({
    id,
    started_at: momentOf(found, found.from),
    ended_at: momentOf(found, found.to),
    log_id: found.logId,
    station_id: found.stationId,
    recording_id: found.recordingId,
    engine_version: 'test',
    log_start_ms: found.from * 1000,
    log_end_ms: found.to * 1000,
    reference_start_ms: 0,
    speed_ratio: 1,
    confidence: 20,
    expected_false_alarms: 1e-20,
    decision,
    agreeing_hashes: 100,
    evidence: JSON.stringify([]),
  })
  return id
}

/** A play that counts, with the detection it came from. */
export async function addPlay(database: Database, found: Found, localDay: string) {
  const detectionId = await addDetection(database, found, 'accept')
  const id = playIdSchema.parse(randomUUID())
  await database('plays').insert({
    id,
    detection_id: detectionId,
    detection_started_at: momentOf(found, found.from),
    station_id: found.stationId,
    recording_id: found.recordingId,
    started_at: momentOf(found, found.from),
    ended_at: momentOf(found, found.to),
    local_day: localDay,
  })
  return { id, detectionId }
}

export async function closeMonth(database: Database, month: string): Promise<void> {
  await database('distribution_months')
    .insert({ month: `${month}-01`, status: 'calculated' })
    .onConflict('month')
    .merge()
}

/** Audit actions about one thing, oldest first. */
export async function auditOf(
  database: Database,
  subjectId: string,
): Promise<{ action: string; summary: string }[]> {
  return database('audit_events')
    .where({ subject_id: subjectId })
    .orderBy('id')
    .select<{ action: string; summary: string }[]>('action', 'summary')
}

/** A WAV file of a tone, 8 kHz, 16 bit, mono, written by hand; other frequencies give other bytes. */
export function toneWave(seconds: number, hertz: number): Blob {
  const samples = Math.round(seconds * 8000)
  const bytes = Buffer.alloc(44 + samples * 2)
  bytes.write('RIFF', 0, 'latin1')
  bytes.writeUInt32LE(36 + samples * 2, 4)
  bytes.write('WAVEfmt ', 8, 'latin1')
  bytes.writeUInt32LE(16, 16)
  bytes.writeUInt16LE(1, 20)
  bytes.writeUInt16LE(1, 22)
  bytes.writeUInt32LE(8000, 24)
  bytes.writeUInt32LE(16_000, 28)
  bytes.writeUInt16LE(2, 32)
  bytes.writeUInt16LE(16, 34)
  bytes.write('data', 36, 'latin1')
  bytes.writeUInt32LE(samples * 2, 40)
  for (let index = 0; index < samples; index += 1) {
    bytes.writeInt16LE(Math.round(8000 * Math.sin((2 * Math.PI * hertz * index) / 8000)), 44 + index * 2)
  }
  return new Blob([new Uint8Array(bytes)])
}

export function formWith(
  file: Blob | string,
  fileName: string,
  fields: Record<string, string> = {},
): FormData {
  const form = new FormData()
  for (const [name, value] of Object.entries(fields)) form.set(name, value)
  form.set('file', typeof file === 'string' ? new Blob([file]) : file, fileName)
  return form
}
