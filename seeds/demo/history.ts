import { createHash } from 'node:crypto'
import type { Database } from '@fieldfare/database'
import type { DateTime } from 'luxon'
import { DateTime as Clock } from 'luxon'
import type { DemoRecording } from './catalogue.ts'
import { createRandom, type Random } from './random.ts'
import type { DemoStation } from './society.ts'

/**
 * Play history without audio: logs whose sound is no longer kept, what was heard in them, and the plays counted then.
 */
export type HistoryPlan = {
  month: DateTime<true>
  /** Days of the month to fill, from the first. */
  days: number
  recordings: readonly DemoRecording[]
  lengthsMs: ReadonlyMap<string, number>
  uploadedBy: string
}

const LOG_HOURS = 6
const CROSSFADE_MS = 3000

type Play = { recordingId: string; startMs: number; endMs: number }
type Span = { kind: 'music' | 'speech' | 'silence'; startMs: number; endMs: number }

/** Six hours of a talk-led programme: speech, then one to three tunes, sometimes one that nobody has catalogued. */
function planLog(
  plan: HistoryPlan,
  random: Random,
  { logMs, talkSeconds }: { logMs: number; talkSeconds: readonly [number, number] },
): { plays: Play[]; spans: Span[] } {
  const plays: Play[] = []
  const spans: Span[] = []
  let position = 0
  const add = (kind: Span['kind'], until: number) => {
    const endMs = Math.min(until, logMs)
    if (endMs > position) spans.push({ kind, startMs: position, endMs })
    position = endMs
  }
  while (position < logMs) {
    add('speech', position + random.between(...talkSeconds) * 1000)
    if (position >= logMs) break
    let musicEnd = position
    for (let tunes = random.between(1, 3); tunes > 0; tunes -= 1) {
      if (random.chance(0.16)) {
        musicEnd += random.between(100, 200) * 1000
        continue
      }
      const recording = random.pick(plan.recordings)
      const startMs = Math.max(position, musicEnd - CROSSFADE_MS)
      const endMs = startMs + (plan.lengthsMs.get(recording.id) ?? 120_000)
      if (endMs > logMs || plays.at(-1)?.recordingId === recording.id) break
      plays.push({ recordingId: recording.id, startMs, endMs })
      musicEnd = endMs
    }
    add('music', Math.max(position, musicEnd))
    if (random.chance(0.05)) add('silence', position + random.between(3, 9) * 1000)
  }
  return { plays, spans }
}

/** Nights have more music and less talk. */
function talkOf({ talkSeconds: [low, high] }: DemoStation, start: DateTime<true>): readonly [number, number] {
  return start.hour < LOG_HOURS ? [Math.round(low / 2), Math.round(high / 2)] : [low, high]
}

function total(spans: readonly Span[], kind: Span['kind']): number {
  return spans.reduce((sum, span) => (span.kind === kind ? sum + span.endMs - span.startMs : sum), 0)
}

async function insertLog(database: Database, plan: HistoryPlan, station: DemoStation, start: DateTime<true>) {
  // Six hours on the clock are five or seven where the clocks change.
  const logMs =
    start
      .startOf('day')
      .set({ hour: start.hour + LOG_HOURS })
      .toMillis() - start.toMillis()
  const random = createRandom(start.toMillis() / 1000 + station.callName.charCodeAt(0) * 7919)
  const { plays, spans } = planLog(plan, random, { logMs, talkSeconds: talkOf(station, start) })
  const end = start.plus({ milliseconds: logMs })
  const fileName = `${station.callName}_${start.toFormat('yyyy-LL-dd_HH-mm')}.mp3`
  const rows: { id: string }[] = await database('station_logs')
    .insert({
      station_id: station.id,
      file_name: fileName,
      size_bytes: Math.round((logMs / 1000) * 8000),
      sha256: createHash('sha256').update(fileName).digest(),
      format: 'MP3',
      started_at: start.toJSDate(),
      duration_ms: logMs,
      airtime: database.raw('tstzrange(?, ?)', [start.toJSDate(), end.toJSDate()]),
      status: 'analysed',
      music_ms: total(spans, 'music'),
      speech_ms: total(spans, 'speech'),
      silence_ms: total(spans, 'silence'),
      uploaded_by: plan.uploadedBy,
      uploaded_at: end.plus({ minutes: 20 }).toJSDate(),
      analysed_at: end.plus({ minutes: 24 }).toJSDate(),
    })
    .returning('id')
  const logId = rows[0]?.id
  const spanRows = spans.map((span) => ({
    log_id: logId,
    start_ms: span.startMs,
    end_ms: span.endMs,
    kind: span.kind,
  }))
  const at = (milliseconds: number) => start.plus({ milliseconds })
  const playRows = plays.map((play) => ({
    station_id: station.id,
    recording_id: play.recordingId,
    started_at: at(play.startMs).toJSDate(),
    ended_at: at(play.endMs).toJSDate(),
    local_day: at(play.startMs).toISODate(),
  }))
  return { spanRows, playRows }
}

/** A recorder fails now and then: hours that are missing, and stay missing. */
function isMissing(random: Random): boolean {
  return random.chance(0.035)
}

/** @returns how many plays were written */
export async function insertHistory(
  database: Database,
  stations: readonly DemoStation[],
  plan: HistoryPlan,
): Promise<number> {
  const spanRows: object[] = []
  const playRows: object[] = []
  for (const station of stations) {
    const random = createRandom(plan.month.month * 100 + station.callName.charCodeAt(1))
    for (let day = 1; day <= plan.days; day += 1) {
      for (let hour = 0; hour < 24; hour += LOG_HOURS) {
        if (isMissing(random)) continue
        const start = Clock.fromObject(
          { year: plan.month.year, month: plan.month.month, day, hour },
          { zone: station.timeZone },
        )
        if (!start.isValid) throw new Error(`No such time: ${start.invalidExplanation ?? ''}`)
        const rows = await insertLog(database, plan, station, start)
        spanRows.push(...rows.spanRows)
        playRows.push(...rows.playRows)
      }
    }
  }
  await database.batchInsert('log_spans', spanRows, 2000)
  await database.batchInsert('plays', playRows, 2000)
  await database.raw(
    `insert into play_events (play_id, kind, actor_name)
     select p.id, 'created', 'Opening records' from plays p
     where not exists (select 1 from play_events e where e.play_id = p.id)`,
  )
  return playRows.length
}
