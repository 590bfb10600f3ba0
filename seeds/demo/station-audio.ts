import { join } from 'node:path'
import {
  composeTune,
  renderDemoLog,
  renderSpeech,
  renderTune,
  type DemoLogItem,
  type EncodingFormat,
} from '@fieldfare/audio'
import type { DateTime } from 'luxon'
import { DateTime as Clock } from 'luxon'
import type { DemoRecording } from './catalogue.ts'
import { FIRST_UNKNOWN_TUNE } from './catalogue-plan.ts'
import { announcements } from './invented-names.ts'
import type { DemoMonths } from './months.ts'
import { createRandom, type Random } from './random.ts'
import { SAMPLE_RATE } from './reference-audio.ts'
import type { DemoStation } from './society.ts'

export type DemoLogFile = { station: DemoStation; path: string; start: DateTime<true> }

const formats: readonly EncodingFormat[] = ['mp3', 'flac', 'ogg', 'wav']
const LOG_SECONDS = 45 * 60
const AVERAGE_TUNE_SECONDS = 125
const voices = ['en-gb', 'en-us', 'en-gb-scotland', 'en-us'] as const

function tune(seed: number, label: string, overlapSeconds: number): DemoLogItem {
  return {
    kind: 'tune',
    label,
    overlapSeconds,
    samples: () => renderTune(composeTune(seed), SAMPLE_RATE),
  }
}

/** Announcements in the voice of a station; none where the machine cannot speak. */
async function speakAll(voice: string): Promise<Float32Array[]> {
  const spoken: Float32Array[] = []
  for (const text of announcements) {
    const samples = await renderSpeech(text, { name: voice, sampleRateHz: SAMPLE_RATE })
    if (samples) spoken.push(samples)
  }
  return spoken
}

/** Speech, tunes that fade into each other, speech over the beginning of a tune, a tune nobody knows, a pause. */
function planProgramme(
  recordings: readonly DemoRecording[],
  spoken: readonly Float32Array[],
  random: Random,
): DemoLogItem[] {
  const items: DemoLogItem[] = []
  let seconds = 0
  let last = ''
  const add = (item: DemoLogItem, length: number) => {
    items.push(item)
    seconds += length
  }
  const speak = (overlapSeconds: number) => {
    if (spoken.length === 0) return
    const samples = random.pick(spoken)
    add({ kind: 'speech', samples, overlapSeconds }, samples.length / SAMPLE_RATE - overlapSeconds)
  }
  const play = (overlapSeconds: number) => {
    const recording = random.pick(recordings.filter(({ isrc }) => isrc !== last))
    last = recording.isrc
    add(tune(recording.tuneSeed, recording.isrc, overlapSeconds), AVERAGE_TUNE_SECONDS)
  }
  while (seconds < LOG_SECONDS - 3 * AVERAGE_TUNE_SECONDS) {
    speak(0)
    play(items.length === 0 ? 0 : 2)
    play(3)
    if (random.chance(0.3)) add({ kind: 'silence', seconds: 3 }, 3)
    speak(0)
    if (random.chance(0.35)) {
      add(tune(FIRST_UNKNOWN_TUNE + random.between(0, 2), 'unknown', 0), AVERAGE_TUNE_SECONDS)
    }
  }
  return items
}

/** Makes one recording of a broadcast for every station, on a day of the current month, each in another format. */
export async function makeStationAudio(options: {
  stations: readonly DemoStation[]
  recordings: readonly DemoRecording[]
  months: DemoMonths
  directory: string
  onLog: (log: DemoLogFile) => Promise<void>
}): Promise<void> {
  const { stations, recordings, months, directory } = options
  for (const [n, station] of stations.entries()) {
    const start = Clock.fromObject(
      { year: months.current.year, month: months.current.month, day: 24, hour: n < 2 ? 10 : 17 },
      { zone: station.timeZone },
    )
    if (!start.isValid) throw new Error(`No such time: ${start.invalidExplanation ?? ''}`)
    const format = formats[n % formats.length] ?? 'mp3'
    const path = join(directory, `${station.callName}_${start.toFormat("yyyyLLdd'T'HHmmss")}.${format}`)
    const items = planProgramme(
      recordings,
      await speakAll(voices[n % voices.length] ?? 'en-gb'),
      createRandom(70 + n),
    )
    await renderDemoLog(path, { sampleRateHz: SAMPLE_RATE, items }, { format })
    await options.onLog({ station, path, start })
  }
}
