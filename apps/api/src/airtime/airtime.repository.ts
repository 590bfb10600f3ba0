import type { DetectionId, LocalDate, PlayId, StationId, StationLogId } from '@fieldfare/contracts'
import type { Connection } from '@fieldfare/database'
import type { Interval } from './intervals.ts'

/** A stretch of one station's airtime, wanted from a caller who has checked that the station is in scope. */
export type AirtimeRange = Interval & { stationId: StationId }

export type HeldSpan = Interval & { logId: StationLogId }
export type HeardSpan = HeldSpan & { kind: 'music' | 'speech' | 'silence' }
export type FoundSpan = Interval & { detectionId: DetectionId; logId: StationLogId; label: string }
export type PlayedSpan = Interval & {
  playId: PlayId
  detectionId: DetectionId | null
  logId: StationLogId | null
  label: string
  localDay: LocalDate
}

/** Nothing on air is longer: lets the time index find what began before a range and reaches into it. */
const LONGEST = "interval '1 day'"

const milliseconds = (expression: string) => `floor(extract(epoch from ${expression}) * 1000)::float8`

function bindRange(range: AirtimeRange): { stationId: StationId; from: string; to: string } {
  return {
    stationId: range.stationId,
    from: new Date(range.fromMs).toISOString(),
    to: new Date(range.toMs).toISOString(),
  }
}

export async function listHeld(connection: Connection, range: AirtimeRange): Promise<HeldSpan[]> {
  const { stationId, from, to } = bindRange(range)
  return connection('station_logs')
    .where({ station_id: stationId })
    .whereNot({ status: 'rejected' })
    .whereRaw('airtime && tstzrange(?, ?)', [from, to])
    .orderByRaw('lower(airtime)')
    .select<HeldSpan[]>(
      { logId: 'id' },
      connection.raw(`${milliseconds('lower(airtime)')} as "fromMs"`),
      connection.raw(`${milliseconds('upper(airtime)')} as "toMs"`),
    )
}

/** What was heard, cut to what each log is held for: where recorders overlap it counts once. */
export async function listHeard(connection: Connection, range: AirtimeRange): Promise<HeardSpan[]> {
  const { stationId, from, to } = bindRange(range)
  const heard = connection('station_logs')
    .join('log_spans', 'log_spans.log_id', 'station_logs.id')
    .where({ station_id: stationId })
    .whereNot({ status: 'rejected' })
    .whereRaw('airtime && tstzrange(?, ?)', [from, to])
    .select(
      { logId: 'station_logs.id', kind: 'log_spans.kind' },
      connection.raw(
        "greatest(lower(airtime), started_at + start_ms * interval '1 millisecond') as heard_from",
      ),
      connection.raw("least(upper(airtime), started_at + end_ms * interval '1 millisecond') as heard_to"),
    )
    .as('heard')
  return connection
    .from(heard)
    .whereRaw('heard_from < heard_to and heard_from < ? and heard_to > ?', [to, from])
    .orderBy('heard_from')
    .select<HeardSpan[]>(
      'logId',
      'kind',
      connection.raw(`${milliseconds('heard_from')} as "fromMs"`),
      connection.raw(`${milliseconds('heard_to')} as "toMs"`),
    )
}

export async function listCountedPlays(connection: Connection, range: AirtimeRange): Promise<PlayedSpan[]> {
  const { stationId, from, to } = bindRange(range)
  return connection('plays')
    .join('recordings', 'recordings.id', 'plays.recording_id')
    .leftJoin('detections', (join) =>
      join
        .on('detections.id', 'plays.detection_id')
        .andOn('detections.started_at', 'plays.detection_started_at'),
    )
    .where({ 'plays.station_id': stationId, 'plays.status': 'counted' })
    .whereRaw(
      `plays.started_at > ?::timestamptz - ${LONGEST} and plays.started_at < ? and plays.ended_at > ?`,
      [from, to, from],
    )
    .orderBy([{ column: 'plays.started_at' }, { column: 'plays.id' }])
    .select<PlayedSpan[]>(
      {
        playId: 'plays.id',
        detectionId: 'plays.detection_id',
        logId: 'detections.log_id',
        localDay: 'plays.local_day',
      },
      connection.raw("recordings.title || ' · ' || recordings.artist as label"),
      connection.raw(`${milliseconds('plays.started_at')} as "fromMs"`),
      connection.raw(`${milliseconds('plays.ended_at')} as "toMs"`),
    )
}

/** Doubtful detections that nobody has decided on yet. */
export async function listWaitingDetections(
  connection: Connection,
  range: AirtimeRange,
): Promise<FoundSpan[]> {
  const { stationId, from, to } = bindRange(range)
  return connection('detections')
    .join('recordings', 'recordings.id', 'detections.recording_id')
    .where({ station_id: stationId, decision: 'review' })
    .whereRaw('not exists (select from detection_reviews where detection_id = detections.id)')
    .whereRaw(`started_at > ?::timestamptz - ${LONGEST} and started_at < ? and ended_at > ?`, [
      from,
      to,
      from,
    ])
    .orderBy([{ column: 'started_at' }, { column: 'detections.id' }])
    .select<FoundSpan[]>(
      { detectionId: 'detections.id', logId: 'detections.log_id' },
      connection.raw("recordings.title || ' · ' || recordings.artist as label"),
      connection.raw(`${milliseconds('started_at')} as "fromMs"`),
      connection.raw(`${milliseconds('ended_at')} as "toMs"`),
    )
}
