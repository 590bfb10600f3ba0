import { openAsBlob } from 'node:fs'
import { basename } from 'node:path'
import {
  approveDistribution,
  calculateDistribution,
  getDistribution,
  getLog,
  issueDistribution,
  listDetections,
  openDispute,
  replyToDispute,
  signIn,
  uploadLog,
  type Month,
  type MonthStatus,
  type StationId,
  type StationLogId,
} from '@fieldfare/contracts'
import type { DateTime } from 'luxon'
import { DeskClient } from './desk-client.ts'
import type { DemoPeople, DemoPerson } from './people.ts'

const POLL_MS = 400

function pause(milliseconds: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, milliseconds))
}

export async function signedIn(address: string, { email, password }: DemoPerson): Promise<DeskClient> {
  const client = new DeskClient(address)
  await client.json(signIn, { body: { email, password } })
  return client
}

/** Sends a log as a station does: file, start on the clock of the station, zone. */
export async function sendLog(
  client: DeskClient,
  log: { stationId: StationId; path: string; start: DateTime<true>; timeZone: string },
): Promise<StationLogId> {
  const form = new FormData()
  form.set('startedAtLocal', log.start.toFormat("yyyy-LL-dd'T'HH:mm:ss"))
  form.set('timeZone', log.timeZone)
  form.set('file', await openAsBlob(log.path), basename(log.path))
  const sent = await client.json(uploadLog, { params: { stationId: log.stationId }, form })
  return sent.id
}

/** Waits until the worker is done with the logs, whatever came of them. */
export async function waitForLogs(
  client: DeskClient,
  logIds: readonly StationLogId[],
  onProgress: (done: number) => void,
): Promise<void> {
  for (const [n, logId] of logIds.entries()) {
    for (;;) {
      const { log } = await client.json(getLog, { params: { logId } })
      if (log.status !== 'queued' && log.status !== 'analysing') break
      await pause(POLL_MS)
    }
    onProgress(n + 1)
  }
}

async function waitForMonth(client: DeskClient, month: Month, status: MonthStatus): Promise<string> {
  for (;;) {
    const distribution = await client.json(getDistribution, { params: { month } })
    if (distribution.status === status) return distribution.digest ?? ''
    if (distribution.failure !== null)
      throw new Error(`The month could not be calculated: ${distribution.failure}`)
    await pause(POLL_MS)
  }
}

/** Closes a month as two clerks do: one calculates, the other approves and issues. */
export async function closeMonth(address: string, people: DemoPeople, month: Month): Promise<void> {
  const [first, second] = [
    await signedIn(address, people.firstClerk),
    await signedIn(address, people.secondClerk),
  ]
  const params = { month }
  await first.json(calculateDistribution, { params })
  const digest = await waitForMonth(first, month, 'calculated')
  await second.json(approveDistribution, { params, body: { digest } })
  await second.json(issueDistribution, { params })
  await waitForMonth(second, month, 'issued')
}

/** One dispute that waits for a decision, so that the desk has something to decide. */
export async function disputeOnePlay(address: string, people: DemoPeople, month: Month): Promise<void> {
  const auditor = await signedIn(address, people.auditor)
  const { items } = await auditor.json(listDetections, {
    query: { month, sort: 'confidence', state: 'accepted' },
  })
  const play = items.map((detection) => detection.play).find((each) => each?.status === 'counted')
  if (!play) return
  const reason =
    'The announcer speaks over most of this. Please check that the tune is really heard for as long as it is credited.'
  const dispute = await auditor.json(openDispute, { body: { playId: play.id, reason } })
  const clerk = await signedIn(address, people.firstClerk)
  await clerk.json(replyToDispute, {
    params: { disputeId: dispute.id },
    body: { text: 'Thank you. I shall listen to both clips and compare the alignment before I decide.' },
  })
}
