import { join } from 'node:path'
import {
  analyseLogAgain,
  listDetections,
  listPlays,
  type DetectionView,
  type StationLogView,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildRealMusicLog, fetchDebianMusic, type MusicTrack, type RealMusicLog } from '../corpus/index.ts'
import { buildRecording } from '../factories/build-catalogue.ts'
import { buildStation } from '../factories/build-station.ts'
import { sendLog, sendReference, settledLog } from '../support/desk-work.ts'
import { temporaryDirectory } from '../support/index.ts'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'
import { startTestWorker } from '../support/test-worker.ts'

/**
 * The whole product on real music, that of Debian's package wesnoth-1.16-music: references and a half-hour log go in
 * over HTTP, the worker takes them from its queue, and what it says was played is compared with what was.
 */
const PACKAGE = 'wesnoth-1.16-music'
/** A dozen pieces that together last just over half an hour. */
const CATALOGUE = [
  'battle-epic',
  'breaking_the_chains',
  'elvish-theme',
  'frantic',
  'into_the_shadows',
  'journeys_end',
  'love_theme',
  'loyalists',
  'nunc_dimittis',
  'sad',
  'the_deep_path',
  'underground',
]
const NOT_IN_CATALOGUE = ['knolls', 'northerners']
const CROSSFADE_SECONDS = 4
const TIME_ZONE = 'Europe/Lisbon'
/** Summer time: one hour ahead of UTC. */
const STARTED_AT_LOCAL = '2026-07-14T06:00:00'
const STARTED_AT_MS = Date.parse('2026-07-14T05:00:00Z')
const LONG = { timeoutMs: 300_000 }

let api: TestApi
let clerk: TestClient
let truth: RealMusicLog
let log: StationLogView

function trackNamed(tracks: readonly MusicTrack[], name: string): MusicTrack {
  const found = tracks.find((track) => track.name === name)
  if (found === undefined) throw new Error(`${PACKAGE} holds no ${name}`)
  return found
}

/** The twelve pieces whole, parts of two that no catalogue holds, and the first piece once more. */
function airHalfAnHour(tracks: readonly MusicTrack[], path: string): Promise<RealMusicLog> {
  const known = CATALOGUE.map((name) => ({ track: trackNamed(tracks, name) }))
  const unknown = NOT_IN_CATALOGUE.map((name) => ({
    track: trackNamed(tracks, name),
    seconds: 120,
    isUnknown: true,
  }))
  const order = [
    ...known.slice(0, 5),
    ...unknown.slice(0, 1),
    ...known.slice(5),
    ...unknown.slice(1),
    ...known.slice(0, 1),
  ]
  return buildRealMusicLog({ tracks: order, path, crossfadeSeconds: CROSSFADE_SECONDS, bitRate: '64k' })
}

async function allDetections(): Promise<DetectionView[]> {
  const query = { logId: log.id, sort: 'startedAt', pageSize: '200' }
  return (await clerk.json(listDetections, { query })).items
}

async function acceptedDetections(): Promise<DetectionView[]> {
  return (await allDetections()).filter(({ decision }) => decision === 'accept')
}

beforeAll(async () => {
  api = await startTestApi()
  await startTestWorker(api)
  const station = await buildStation(api.database, { timeZone: TIME_ZONE })
  clerk = (await api.signInAs('clerk')).client
  const uploader = (await api.signInAs('uploader', { stationIds: [station.id] })).client
  const tracks = await fetchDebianMusic(PACKAGE)
  for (const name of CATALOGUE) {
    const { id } = await buildRecording(api.database, { title: name })
    const reference = await sendReference(clerk, id, trackNamed(tracks, name).path)
    if (reference.status !== 'ready') throw new Error(`${name}: ${reference.failure ?? 'no fingerprint'}`)
  }
  truth = await airHalfAnHour(tracks, join(await temporaryDirectory('real-music'), 'half-hour.mp3'))
  const { path } = truth
  const sent = await sendLog(uploader, {
    stationId: station.id,
    path,
    startedAtLocal: STARTED_AT_LOCAL,
    timeZone: TIME_ZONE,
  })
  log = await settledLog(clerk, sent.id, LONG)
}, 600_000)

describe('half an hour of real music', () => {
  it('is analysed to its end, without a warning', () => {
    expect(log).toMatchObject({ status: 'analysed', failure: null, warnings: [] })
    expect(truth.seconds).toBeGreaterThan(1800)
    expect(Math.abs((log.durationSeconds ?? 0) - truth.seconds)).toBeLessThan(1)
  })

  it('yields every play once, right within a second at both ends, and accepts nothing else', async () => {
    const accepted = await acceptedDetections()
    expect(accepted.map(({ recording }) => recording.title)).toEqual(truth.plays.map(({ track }) => track))
    const offBy = (instant: string | undefined, seconds: number) =>
      Math.abs((Date.parse(instant ?? '') - STARTED_AT_MS) / 1000 - seconds)
    const errors = truth.plays.map((play, index) => ({
      track: play.track,
      startError: offBy(accepted[index]?.startedAt, play.start),
      endError: offBy(accepted[index]?.endedAt, play.end),
    }))
    const wrong = errors.filter(({ startError, endError }) => !(startError < 1 && endError < 1))
    expect(wrong).toEqual([])
    expect(truth.plays).toHaveLength(CATALOGUE.length + 1)
  })

  it('counts each as one play of the day on which the station sent it', async () => {
    const { items, total } = await clerk.json(listPlays, { query: { sort: 'startedAt' } })
    expect(total).toBe(truth.plays.length)
    expect(new Set(items.map(({ localDay }) => localDay))).toEqual(new Set(['2026-07-14']))
    expect(items.map(({ detectionId }) => detectionId)).toEqual(
      (await acceptedDetections()).map(({ id }) => id),
    )
  })

  it('gives the very same detections and plays, and no more, when it is analysed again', async () => {
    const before = await allDetections()
    await clerk.json(analyseLogAgain, { params: { logId: log.id } })
    await settledLog(clerk, log.id, LONG)
    expect(await allDetections()).toEqual(before)
    expect((await clerk.json(listPlays)).total).toBe(truth.plays.length)
  }, 300_000)
})
