import { join } from 'node:path'
import { composeTune, renderTune, writeAudioFile } from '@fieldfare/audio'
import { buildParty, buildRecording, buildShare, buildWork } from '../../factories/build-catalogue.ts'
import type { BuiltParty, BuiltRecording } from '../../factories/build-catalogue.ts'
import { buildStation, type BuiltStation } from '../../factories/build-station.ts'
import { sendReference } from '../../support/desk-work.ts'
import { findFreePort, temporaryDirectory, webDirectory } from '../../support/index.ts'
import { startTestApi, type TestApi } from '../../support/test-api.ts'
import { startTestWorker } from '../../support/test-worker.ts'

/** Three hours behind UTC all year round, so that local times can be read off. */
export const STATION_ZONE = 'America/Sao_Paulo'
export const STATION_OFFSET = '-03:00'
export const SAMPLE_RATE_HZ = 22_050

/** The product with its web application, served to browsers on a port of its own. */
export async function startProduct(): Promise<TestApi> {
  const port = await findFreePort()
  const url = `http://127.0.0.1:${port}`
  return startTestApi({
    FIELDFARE_API_PORT: String(port),
    FIELDFARE_PUBLIC_URL: url,
    FIELDFARE_WEB_DIR: await webDirectory(),
  })
}

/** What the composer makes of a number: a tune nobody else has. */
export function tuneOf(number: number): Float32Array {
  return renderTune(composeTune(number), SAMPLE_RATE_HZ)
}

export type Desk = {
  api: TestApi
  directory: string
  station: BuiltStation
  otherStation: BuiltStation
  /** Two recordings of one work, and the tunes they hold. */
  recordings: readonly [Played, Played]
  publisher: BuiltParty
  coPublisher: BuiltParty
  label: BuiltParty
}

export type Played = { recording: BuiltRecording; tune: Float32Array }

/**
 * A desk ready to work: two stations, one work in two recordings with reference audio, and who holds what. The work
 * belongs to the publisher by 60 % and to the co-publisher by 40 %; the label holds the first recording and the
 * co-publisher the second.
 */
export async function openDesk(api: TestApi): Promise<Desk> {
  const { database } = api
  const directory = await temporaryDirectory('audio')
  await database('deduction_rules').insert([
    { rules_version: '1', position: 1, code: 'administration', label: 'Administration', rate_ppm: 125_000 },
    { rules_version: '1', position: 2, code: 'social', label: 'Social fund', rate_ppm: 20_000 },
  ])
  const station = await buildStation(database, {
    callName: 'BROOK',
    name: 'Brook FM',
    timeZone: STATION_ZONE,
  })
  const otherStation = await buildStation(database, { callName: 'HEATH', name: 'Heath FM', licence: false })
  const publisher = await buildParty(database, 'Alder Songs')
  const coPublisher = await buildParty(database, 'Rowan Music')
  const label = await buildParty(database, 'Hazel Records')
  const workId = await buildWork(database, 'Morning Tide')
  await buildShare(database, { workId }, { party: publisher, sharePpm: 600_000 })
  await buildShare(database, { workId }, { party: coPublisher, sharePpm: 400_000 })
  const first = await buildRecording(database, {
    title: 'Morning Tide',
    artist: 'The Sedges',
    workId,
    shares: [{ party: label }],
  })
  const second = await buildRecording(database, {
    title: 'Morning Tide, at dusk',
    artist: 'The Sedges',
    workId,
    shares: [{ party: coPublisher }],
  })
  return {
    ...{ api, directory, station, otherStation, publisher, coPublisher, label },
    recordings: [
      { recording: first, tune: tuneOf(101) },
      { recording: second, tune: tuneOf(102) },
    ],
  }
}

/** Lets a worker fingerprint the reference audio of both recordings; it stops when done. */
export async function fingerprintRecordings(desk: Desk): Promise<void> {
  const { api, directory, recordings } = desk
  const worker = await startTestWorker(api)
  const { client } = await api.signInAs('clerk')
  for (const { recording, tune } of recordings) {
    const path = join(directory, `${recording.isrc}.wav`)
    await writeAudioFile(path, tune, SAMPLE_RATE_HZ, { format: 'wav' })
    await sendReference(client, recording.id, path)
  }
  await worker.stop()
}
