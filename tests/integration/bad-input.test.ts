import { readFile, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { composeTune, renderTune, writeAudioFile } from '@fieldfare/audio'
import {
  getLog,
  getReadiness,
  listDetections,
  problemSchema,
  uploadLog,
  uploadReferenceAudio,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildRecording, type BuiltRecording } from '../factories/build-catalogue.ts'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { fileForm, sendLog, sendReference, settledLog, settledReference } from '../support/desk-work.ts'
import { temporaryDirectory } from '../support/index.ts'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'
import { startTestWorker } from '../support/test-worker.ts'

/**
 * What should never have been sent, through API and worker together: each ends in words where it was sent from, what
 * was sent is kept, and the next good recording is taken as if nothing had been.
 *
 * The rest of bad input is proved beside its feature: logs refused at once (empty, text, pictures, doubles, foreign
 * stations, overlaps at the start, impossible starts) in logs-upload.test.ts, reference audio in
 * reference-audio.test.ts, ISRC, ISWC, IPI and shares in catalogue.test.ts, CSV rows, encodings and formulas in
 * catalogue-imports.test.ts, forged, expired and repeated tokens in auth-sessions.test.ts, broken requests in
 * access-http.test.ts.
 */
const SAMPLE_RATE_HZ = 22_050
const TIME_ZONE = 'Europe/Lisbon'
const CUT_AT_BYTES = 1_800_000
const tune = renderTune(composeTune(7), SAMPLE_RATE_HZ).subarray(0, 60 * SAMPLE_RATE_HZ)

let api: TestApi
let clerk: TestClient
let uploader: TestClient
let station: BuiltStation
let recording: BuiltRecording
let directory: string
let day = 0

beforeAll(async () => {
  api = await startTestApi()
  await startTestWorker(api)
  directory = await temporaryDirectory('audio')
  station = await buildStation(api.database, { timeZone: TIME_ZONE })
  recording = await buildRecording(api.database, { title: 'Good tune' })
  clerk = (await api.signInAs('clerk')).client
  uploader = (await api.signInAs('uploader', { stationIds: [station.id] })).client
  const path = join(directory, 'good.wav')
  await writeAudioFile(path, tune, SAMPLE_RATE_HZ, { format: 'wav' })
  await sendReference(clerk, recording.id, path)
})

/** Six in the morning of a day on which nothing is held yet. */
function aFreeMorning(): string {
  day += 1
  return `2026-03-${String(day).padStart(2, '0')}T06:00:00`
}

async function written(name: string, bytes: Uint8Array): Promise<string> {
  const path = join(directory, name)
  await writeFile(path, bytes)
  return path
}

async function encoded(name: string, samples: Float32Array, format: 'wav' | 'mp3' | 'flac'): Promise<string> {
  const path = join(directory, name)
  await writeAudioFile(path, samples, SAMPLE_RATE_HZ, { format })
  return path
}

/** The head of a WAV file that promises four gigabytes, and a second of them. */
async function boastfulWave(): Promise<string> {
  const whole = await readFile(await encoded('whole.wav', tune.subarray(0, SAMPLE_RATE_HZ), 'wav'))
  whole.writeUInt32LE(0xffff_fff0, 4)
  whole.writeUInt32LE(0xffff_ff00, 40)
  return written('boastful.wav', whole)
}

/** A WAV file that says it has no channel. */
async function channelless(): Promise<string> {
  const whole = await readFile(await encoded('mono.wav', tune.subarray(0, SAMPLE_RATE_HZ), 'wav'))
  whole.writeUInt16LE(0, 22)
  return written('channelless.wav', whole)
}

/** The tag of an MP3 file with nothing behind it but noughts. */
function tagOnly(): Promise<string> {
  const tag = Buffer.alloc(4096)
  tag.write('ID3', 0, 'latin1')
  tag.writeUInt8(4, 3)
  tag.writeUInt8(8, 8)
  return written('tag-only.mp3', tag)
}

/** MP3 frames whose content is garbled from the second kilobyte on. */
async function garbled(): Promise<string> {
  const whole = await readFile(await encoded('sound.mp3', tune, 'mp3'))
  return written(
    'garbled.mp3',
    whole.map((byte, index) => (index > 2000 ? (byte ^ (index * 31)) & 0xff : byte)),
  )
}

const silence = new Float32Array(SAMPLE_RATE_HZ * 30)

const unusable: [string, () => Promise<string>][] = [
  ['half a minute of silence', () => encoded('silent.wav', silence, 'wav')],
  ['silence in an MP3 file', () => encoded('silent.mp3', silence, 'mp3')],
  ['a recording of no length', () => encoded('nothing.wav', new Float32Array(0), 'wav')],
  ['a head without a channel', channelless],
  ['a tag without sound', tagOnly],
]

async function send(path: string, startedAtLocal = aFreeMorning(), fileName?: string) {
  const sent = await sendLog(uploader, {
    ...{ stationId: station.id, path, startedAtLocal, timeZone: TIME_ZONE },
    ...(fileName === undefined ? {} : { fileName }),
  })
  return settledLog(uploader, sent.id)
}

function detailOf(problem: string): string {
  return problemSchema.parse(JSON.parse(problem)).detail
}

async function refusalOfLog(path: string): Promise<string> {
  const startedAtLocal = aFreeMorning()
  const form = await fileForm(path, { startedAtLocal, timeZone: TIME_ZONE })
  const answer = await uploader.call(uploadLog, { params: { stationId: station.id }, form })
  if (answer.status !== 200) return detailOf(answer.text)
  const { id } = uploadLog.answer.schema.parse(JSON.parse(answer.text))
  const log = await settledLog(uploader, id)
  return log.status === 'rejected' ? (log.failure?.message ?? '') : `taken as ${log.status}`
}

describe('a station log that cannot be used', () => {
  it.each(unusable)('%s is refused in words, at once or by the worker', async (_what, make) => {
    const before = await api.database('station_logs').where({ status: 'failed' })
    const words = await refusalOfLog(await make())
    expect(words).toMatch(/[A-Z][^.]{20,}\./)
    expect(words).not.toMatch(/taken as|Error|undefined|ffmpeg|at .*\.ts/)
    expect(await api.database('station_logs').where({ status: 'failed' })).toHaveLength(before.length)
  })

  it('is kept with its reason, and gives its airtime free', async () => {
    const startedAtLocal = aFreeMorning()
    const refused = await send(await encoded('hush.flac', silence, 'flac'), startedAtLocal)
    expect(refused).toMatchObject({ status: 'rejected', failure: { code: 'silent' } })
    const { log } = await uploader.json(getLog, { params: { logId: refused.id } })
    expect(log.fileName).toBe('hush.flac')
    const good = await send(await encoded('instead.flac', tune, 'flac'), startedAtLocal)
    expect(good.status).toBe('analysed')
  })
})

describe('a station log that is damaged', () => {
  it('is analysed as far as it goes where it breaks off, and says so', async () => {
    const whole = await readFile(await encoded('to-be-cut.wav', tune, 'wav'))
    const log = await send(await written('cut.wav', whole.subarray(0, CUT_AT_BYTES)))
    expect(log).toMatchObject({ status: 'analysed' })
    expect(log.warnings.join(' ')).toContain('breaks off')
    expect(log.durationSeconds).toBeCloseTo((CUT_AT_BYTES - 44) / 2 / SAMPLE_RATE_HZ, 0)
  })

  it('does not make the worker take a promise for content', async () => {
    const log = await send(await boastfulWave())
    expect(log.status).toBe('analysed')
    expect(log.durationSeconds).toBeCloseTo(1, 0)
  })

  it('ends in a state with words when its frames are garbled', async () => {
    const log = await send(await garbled())
    expect(['analysed', 'rejected']).toContain(log.status)
    expect(log.status === 'rejected' ? log.failure?.message : log.warnings.join(' ')).not.toBe('')
  })

  it('is taken by its content, with a warning, when its name says something else', async () => {
    const log = await send(
      await encoded('real.flac', tune.subarray(SAMPLE_RATE_HZ), 'flac'),
      aFreeMorning(),
      'called.mp3',
    )
    expect(log.status).toBe('analysed')
    expect(log.warnings.join(' ')).toMatch(/file name suggests another format.*FLAC/)
  })
})

describe('a station log that ends within held airtime', () => {
  it('is taken at its start but refused once its length is known, saying by how much and by what', async () => {
    const morning = aFreeMorning()
    const held = await send(await encoded('held.wav', tune, 'wav'), morning)
    expect(held.status).toBe('analysed')
    const halfAMinuteEarlier = new Date(Date.parse(`${morning}Z`) - 30_000).toISOString().slice(0, 19)
    const late = await send(await encoded('late.mp3', tune, 'mp3'), halfAMinuteEarlier)
    expect(late).toMatchObject({ status: 'rejected', failure: { code: 'overlapping-log' } })
    expect(late.failure?.message).toMatch(/overlaps held\.wav, .* by 30 seconds/)
    const { total } = await clerk.json(listDetections, { query: { logId: late.id } })
    expect(total).toBe(0)
  })
})

describe('reference audio that cannot be used', () => {
  it.each(unusable)('%s is refused in words, and the good one stays', async (_what, make) => {
    const { id } = await buildRecording(api.database)
    const path = await make()
    const answer = await clerk.call(uploadReferenceAudio, { form: await fileForm(path, { recordingId: id }) })
    let words = ''
    if (answer.status !== 200) words = detailOf(answer.text)
    else {
      const sent = uploadReferenceAudio.answer.schema.parse(JSON.parse(answer.text))
      const settled = await settledReference(clerk, sent)
      words = settled.status === 'failed' ? (settled.failure ?? '') : `taken as ${settled.status}`
    }
    expect(words).toMatch(/[A-Z][^.]{20,}\./)
    expect(words).not.toMatch(/taken as|Error|undefined|ffmpeg|at .*\.ts/)
  })
})

describe('after all that', () => {
  it('API and worker live, and a good recording is found as before', async () => {
    expect((await api.anonymous().call(getReadiness)).status).toBe(200)
    const log = await send(await encoded('good-again.mp3', tune, 'mp3'))
    expect(log).toMatchObject({ status: 'analysed', warnings: [] })
    const { items } = await clerk.json(listDetections, { query: { logId: log.id } })
    expect(items.map(({ recording: { title }, decision }) => [title, decision])).toEqual([
      ['Good tune', 'accept'],
    ])
    const failed: { kind: string }[] = await api.database('jobs').where({ status: 'failed' }).select('kind')
    expect(failed.filter(({ kind }) => kind === 'analyse-log')).toEqual([])
  })
})
