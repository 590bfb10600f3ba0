import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { decodeMono } from '@fieldfare/audio'
import {
  buildIndexSegment,
  createIndex,
  createLandmarkExtractor,
  createLogAnalyser,
  ENGINE_VERSION,
  engineParameters,
  type CatalogueIndex,
  type Detection,
} from '@fieldfare/fingerprint'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import {
  airBroadcast,
  buildRealMusicLog,
  CORPUS_RATE_HZ,
  createRandom,
  createSpeech,
  decodeSamples,
  fetchDebianMusic,
  levelled,
  mixed,
  writeMp3,
  type MusicTrack,
  type RealMusicLog,
} from '../corpus/index.ts'

/** Real music: the orchestral pieces of Debian's package wesnoth-1.16-music. */
const PACKAGE = 'wesnoth-1.16-music'
const CATALOGUE = [
  'battle',
  'battle-epic',
  'breaking_the_chains',
  'casualties_of_war',
  'elvish-theme',
  'frantic',
  'into_the_shadows',
  'journeys_end',
  'love_theme',
  'nunc_dimittis',
  'the_deep_path',
  'underground',
]
const NOT_IN_CATALOGUE = ['knolls', 'northerners']
const rate = { sampleRateHz: engineParameters.sampleRateHz }

async function buildCatalogue(tracks: readonly MusicTrack[]): Promise<CatalogueIndex> {
  const entries = []
  for (const [recordingNumber, { path }] of tracks.entries()) {
    const extractor = createLandmarkExtractor()
    for await (const samples of decodeMono(path, rate)) extractor.push(samples)
    extractor.finish()
    const durationSeconds = extractor.sampleCount() / rate.sampleRateHz
    const fingerprint = { engineVersion: ENGINE_VERSION, durationSeconds, ...extractor.drain() }
    entries.push({ recordingNumber, fingerprint })
  }
  const index = createIndex()
  index.addSegment(buildIndexSegment(entries))
  return index
}

async function detectIn(path: string, index: CatalogueIndex): Promise<Detection[]> {
  const analyser = createLogAnalyser({ index })
  const detections: Detection[] = []
  for await (const samples of decodeMono(path, rate)) detections.push(...analyser.push(samples))
  return [...detections, ...analyser.finish()]
}

describe('music of wesnoth-1.16-music on air', () => {
  let folder = ''
  let catalogue: MusicTrack[] = []
  let index: CatalogueIndex = createIndex()
  let log: RealMusicLog = { path: '', seconds: 0, plays: [] }
  let detections: Detection[] = []

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'real-music-'))
    const tracks = await fetchDebianMusic(PACKAGE)
    const named = (name: string): MusicTrack => {
      const found = tracks.find((track) => track.name === name)
      if (!found) throw new Error(`${PACKAGE} holds no ${name}`)
      return found
    }
    catalogue = CATALOGUE.map(named)
    index = await buildCatalogue(catalogue)
    const known = catalogue.map((track, n) => ({ track, seconds: 75, fromSeconds: n % 3 === 2 ? 30 : 0 }))
    const unknown = NOT_IN_CATALOGUE.map((name) => ({ track: named(name), isUnknown: true, seconds: 120 }))
    log = await buildRealMusicLog({
      tracks: [
        ...known.slice(0, 5),
        ...unknown.slice(0, 1),
        ...known.slice(5),
        ...unknown.slice(1),
        ...known.slice(0, 1),
      ],
      path: join(folder, 'log.mp3'),
    })
    detections = await detectIn(log.path, index)
  }, 600_000)
  afterAll(() => rm(folder, { recursive: true, force: true }))

  it('finds every play within a second at both ends, through crossfades and 64 kbit/s', () => {
    const found = log.plays.map((play) => {
      const number = catalogue.findIndex(({ name }) => name === play.track)
      const match = detections.find(
        (detection) =>
          detection.recordingNumber === number &&
          Math.abs(detection.startSeconds - play.start) < 1 &&
          Math.abs(detection.endSeconds - play.end) < 1,
      )
      return { track: play.track, start: play.start, isFound: match?.decision === 'accept' }
    })
    expect(found.filter(({ isFound }) => !isFound)).toEqual([])
    expect(found).toHaveLength(CATALOGUE.length + 1)
  })

  it('accepts nothing else, though other music is played', () => {
    const accepted = detections.filter(({ decision }) => decision === 'accept')
    expect(accepted).toHaveLength(log.plays.length)
  })

  it('gives the same detections each time, to the last bit', async () => {
    expect(await detectIn(log.path, index)).toEqual(detections)
  })

  it('finds ten seconds of music with speech over it', async () => {
    const random = createRandom(7)
    const speech = await createSpeech(random)
    const plays = []
    for (const { path, name } of catalogue.slice(0, 6)) {
      const music = levelled(await decodeSamples(path)).slice(30 * CORPUS_RATE_HZ, 40 * CORPUS_RATE_HZ)
      plays.push({ samples: speech(12) }, { samples: mixed(music, speech(10), 3), track: name, refStart: 30 })
    }
    const broadcast = airBroadcast([...plays, { samples: speech(12) }])
    const path = join(folder, 'speech.mp3')
    await writeMp3(broadcast.samples, path)
    const found = await detectIn(path, index)
    const missed = broadcast.plays.filter(
      (play) =>
        !found.some(
          ({ recordingNumber, startSeconds, endSeconds }) =>
            catalogue[recordingNumber]?.name === play.track &&
            startSeconds < play.end &&
            endSeconds > play.start,
        ),
    )
    expect(missed).toEqual([])
    expect(found).toHaveLength(broadcast.plays.length)
  })
})
