import { openDispute as openDisputeEndpoint } from '@fieldfare/contracts'
import {
  buildParty,
  buildRecording,
  buildShare,
  buildWork,
  type BuiltRecording,
} from '../../factories/build-catalogue.ts'
import { buildDetection, type BuiltDetection } from '../../factories/build-detection.ts'
import { buildDistribution, issueDistribution } from '../../factories/build-distribution.ts'
import { buildLog } from '../../factories/build-log.ts'
import { buildPlay } from '../../factories/build-play.ts'
import { buildStation, type BuiltStation } from '../../factories/build-station.ts'
import type { SignedInClient, TestApi } from '../../support/test-api.ts'
import { startProduct } from './desk.ts'
import { monthsOfStory } from './months.ts'

export type DeskRole = 'uploader' | 'clerk' | 'publisher' | 'auditor' | 'admin'

/** A desk on which every page has something to show. */
export type FurnishedDesk = {
  api: TestApi
  people: Record<DeskRole, SignedInClient>
  /** Addresses of single things, by what they are. */
  addresses: Record<
    | 'station'
    | 'stationDay'
    | 'log'
    | 'detection'
    | 'waitingDetection'
    | 'recording'
    | 'work'
    | 'party'
    | 'distribution'
    | 'statement'
    | 'statementLine'
    | 'dispute'
    | 'user',
    string
  >
}

const DETECTIONS = 60
const EVERY_SECONDS = 240

async function buildMorning(api: TestApi, station: BuiltStation, recording: BuiltRecording, day: string) {
  const startedAt = `${day}T03:00:00.000Z`
  const at = (seconds: number) => new Date(Date.parse(startedAt) + seconds * 1000).toISOString()
  const logId = await buildLog(api.database, {
    station,
    startedAt,
    seconds: DETECTIONS * EVERY_SECONDS,
    music: Array.from({ length: DETECTIONS }, (_, index) => [
      index * EVERY_SECONDS,
      index * EVERY_SECONDS + 180,
    ]),
  })
  const detections: BuiltDetection[] = []
  for (let index = 0; index < DETECTIONS; index++) {
    const logStartSeconds = index * EVERY_SECONDS
    detections.push(
      await buildDetection(api.database, {
        ...{ station, recording, logId, logStartSeconds, startedAt: at(logStartSeconds) },
        decision: index % 20 === 3 ? 'review' : 'accept',
      }),
    )
  }
  await buildLog(api.database, { station, startedAt: at(-86_400), status: 'rejected' })
  return { logId, detections }
}

function found<Item>(items: readonly Item[], index: number): Item {
  const item = items[index]
  if (item === undefined) throw new Error(`There is no item ${index}`)
  return item
}

async function issueOneMonth(api: TestApi, parts: Parameters<typeof buildDistribution>[1]) {
  const run = await buildDistribution(api.database, parts)
  await issueDistribution(api.database, run, (await api.createUser('clerk')).userId)
  return found(run.statements, 0).id
}

export async function openFurnishedDesk(): Promise<FurnishedDesk> {
  const api = await startProduct()
  const { database } = api
  const { open, closing } = monthsOfStory()
  const station = await buildStation(database, {
    callName: 'BROOK',
    name: 'Brook FM',
    timeZone: 'America/Sao_Paulo',
  })
  const party = await buildParty(database, 'Alder Songs')
  const workId = await buildWork(database, 'Morning Tide')
  await buildShare(database, { workId }, { party, sharePpm: 600_000 })
  const recording = await buildRecording(database, { title: 'Morning Tide', workId, shares: [{ party }] })
  const play = await buildPlay(database, { station, recording, startedAt: `${closing}-14T12:30:00Z` })
  const calculating = await api.createUser('clerk')
  const month = {
    month: closing,
    requestedBy: calculating.userId,
    station,
    recording,
    play,
    parties: [party],
  }
  const statementId = await issueOneMonth(api, month)
  const { logId, detections } = await buildMorning(api, station, recording, `${open}-01`)
  const people = {
    uploader: await api.signInAs('uploader', { stationIds: [station.id] }),
    clerk: await api.signInAs('clerk'),
    publisher: await api.signInAs('publisher', { partyIds: [party.id] }),
    auditor: await api.signInAs('auditor'),
    admin: await api.signInAs('admin'),
  }
  const disputed = found(detections, 0).play
  const body = { playId: disputed?.id, reason: 'This is the neighbour’s cover version.' }
  const dispute = await people.auditor.client.json(openDisputeEndpoint, { body })
  return {
    api,
    people,
    addresses: {
      station: `/stations/${station.id}`,
      stationDay: `/stations/${station.id}/days/${open}-01`,
      log: `/logs/${logId}`,
      detection: `/detections/${found(detections, 0).id}`,
      waitingDetection: `/detections/${found(detections, 3).id}`,
      recording: `/recordings/${recording.id}`,
      work: `/works/${workId}`,
      party: `/parties/${party.id}`,
      distribution: `/distributions/${closing}`,
      statement: `/statements/${statementId}`,
      statementLine: `/statements/${statementId}/lines/1`,
      dispute: `/disputes/${dispute.id}`,
      user: `/users/${people.publisher.user.userId}`,
    },
  }
}
