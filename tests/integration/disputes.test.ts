import {
  decideDispute,
  getDetection,
  getDispute,
  listDisputes,
  listPlays,
  openDispute,
  replyToDispute,
  type DisputeId,
  type MonthStatus,
  type PlayId,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import {
  buildParty,
  buildRecording,
  type BuiltParty,
  type BuiltRecording,
} from '../factories/build-catalogue.ts'
import { buildDetection } from '../factories/build-detection.ts'
import { buildDistribution, issueDistribution } from '../factories/build-distribution.ts'
import { buildLog } from '../factories/build-log.ts'
import { buildPlay } from '../factories/build-play.ts'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

let api: TestApi
let clerk: SignedInClient
let auditor: SignedInClient
let publisher: SignedInClient
let station: BuiltStation
let party: BuiltParty
let tune: BuiltRecording
let foreign: BuiltRecording

beforeAll(async () => {
  api = await startTestApi()
  station = await buildStation(api.database, { callName: 'MAIN', timeZone: 'Europe/Lisbon' })
  party = await buildParty(api.database, 'Label')
  tune = await buildRecording(api.database, { title: 'Tune', shares: [{ party }] })
  foreign = await buildRecording(api.database, { title: 'Foreign' })
  clerk = await api.signInAs('clerk')
  auditor = await api.signInAs('auditor')
  publisher = await api.signInAs('publisher', { partyIds: [party.id] })
})

let hour = 0
/** A counted play an hour after the last, so that no two overlap. */
async function playOf(recording: BuiltRecording, month = '2026-10'): Promise<PlayId> {
  hour += 1
  const startedAt = new Date(Date.parse(`${month}-02T00:00:00Z`) + hour * 3_600_000).toISOString()
  return (await buildPlay(api.database, { station, recording, startedAt })).id
}

async function open(person: SignedInClient, playId: PlayId, reason = 'This was not played.') {
  return person.client.json(openDispute, { body: { playId, reason } })
}

async function statusOfPlay(id: PlayId): Promise<string | undefined> {
  const row: { status: string } | undefined = await api.database('plays').where({ id }).first('status')
  return row?.status
}

async function mailTo(recipient: string): Promise<{ subject: string; body: string }[]> {
  const rows: { subject: string; body: string }[] = await api
    .database('mail_messages')
    .where({ recipient })
    .orderBy('created_at')
    .select('subject', 'body')
  return rows
}

async function setMonth(month: string, status: MonthStatus): Promise<void> {
  await api
    .database('distribution_months')
    .insert({ month: `${month}-01`, status })
    .onConflict('month')
    .merge()
}

const decide = (disputeId: DisputeId, outcome: 'upheld' | 'dismissed', reason = 'We listened to it.') => ({
  params: { disputeId },
  body: { outcome, reason },
})

describe('opening a dispute', () => {
  it('freezes the facts, tells the clerks by mail and is on the audit trail', async () => {
    const logId = await buildLog(api.database, { station, startedAt: '2026-10-20T10:00:00Z' })
    const detection = await buildDetection(api.database, {
      station,
      recording: tune,
      logId,
      startedAt: '2026-10-20T10:05:00Z',
    })
    if (detection.play === null) throw new Error('The detection has no play')
    const dispute = await open(auditor, detection.play.id)
    expect(dispute).toMatchObject({
      status: 'open',
      detectionId: detection.id,
      month: '2026-10',
      openedByRole: 'auditor',
      isMonthOpen: true,
      canReply: true,
      canDecide: false,
    })
    const row: { evidence: unknown } | undefined = await api
      .database('disputes')
      .where({ id: dispute.id })
      .first('evidence')
    expect(row?.evidence).toMatchObject({
      play: { id: detection.play.id, status: 'counted', localDay: '2026-10-20' },
      recording: { title: 'Tune' },
      detection: { id: detection.id, confidence: 20, agreeingHashes: 42 },
      shares: [{ partyName: 'Label', right: 'recordings', sharePpm: 1_000_000 }],
    })
    const [mail] = await mailTo(clerk.user.email)
    expect(mail?.subject).toBe(`Dispute ${dispute.number} opened`)
    // Lisbon is an hour ahead of UTC until 25 October.
    expect(mail?.body).toContain('20 October 2026, 11:05:00 (Europe/Lisbon)')
    expect(mail?.body).toContain(`http://fieldfare.test/disputes/${dispute.id}`)
    const trail: { action: string }[] = await api
      .database('audit_events')
      .where({ subject_id: dispute.id })
      .select('action')
    expect(trail).toMatchObject([{ action: 'open-dispute' }])
    const detail = await auditor.client.json(getDetection, { params: { detectionId: detection.id } })
    expect(detail).toMatchObject({ openDisputeId: dispute.id, canDispute: false })
    expect(detail.history.map(({ what }) => what)).toContain(`Dispute ${dispute.number} opened`)
    const uploader = await api.signInAs('uploader', { stationIds: [station.id] })
    const forUploader = await uploader.client.json(getDetection, { params: { detectionId: detection.id } })
    expect(forUploader).toMatchObject({ openDisputeId: null, disputes: [] })
  })

  it('is done once a play, also when two open at once', async () => {
    const playId = await playOf(tune)
    const answers = await Promise.all(
      [auditor, publisher].map(({ client }) =>
        client.call(openDispute, { body: { playId, reason: 'Not played.' } }),
      ),
    )
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(await auditor.client.problem(openDispute, { body: { playId, reason: 'Again.' } })).toMatchObject({
      code: 'conflict',
      detail: 'This play is in dispute already.',
    })
    const plays = await auditor.client.json(listPlays, { query: { search: 'Tune', pageSize: '200' } })
    expect(plays.items.find(({ id }) => id === playId)).toMatchObject({
      isInDispute: true,
      canDispute: false,
    })
  })

  it('by a publisher needs a share in what was played', async () => {
    const playId = await playOf(foreign)
    const problem = await publisher.client.problem(openDispute, { body: { playId, reason: 'Not ours.' } })
    expect(problem).toMatchObject({ status: 404, code: 'not-found' })
  })

  it('by a publisher reaches every play of their issued statements, whatever became of the share', async () => {
    const own = await api.signInAs('publisher', { partyIds: [party.id] })
    const startedAt = '2026-07-02T10:00:00Z'
    const play = await buildPlay(api.database, { station, recording: foreign, startedAt })
    const run = await buildDistribution(api.database, {
      month: '2026-07',
      requestedBy: (await api.createUser('clerk')).userId,
      station,
      recording: foreign,
      play,
      parties: [party],
    })
    const request = { body: { playId: play.id, reason: 'Too short.' } }
    expect(await own.client.problem(openDispute, request)).toMatchObject({ status: 404 })
    await issueDistribution(api.database, run, clerk.user.userId)
    expect(await own.client.json(openDispute, request)).toMatchObject({ status: 'open', month: '2026-07' })
  })

  it('needs a play that counts and a reason', async () => {
    const playId = await playOf(tune)
    expect(
      (await auditor.client.problem(openDispute, { body: { playId, reason: ' ' } })).fieldErrors,
    ).toEqual([{ path: 'reason', message: 'Reason is needed.' }])
    await api.database('plays').where({ id: playId }).update({ status: 'removed' })
    expect(await auditor.client.problem(openDispute, { body: { playId, reason: 'Gone.' } })).toMatchObject({
      status: 409,
      detail: 'This play is not counted, so there is nothing to dispute.',
    })
    expect((await clerk.client.problem(openDispute, { body: { playId, reason: 'x' } })).code).toBe(
      'not-allowed',
    )
  })
})

describe('the list of disputes', () => {
  it('holds for a publisher what they opened, for the desk everything', async () => {
    const theirs = await open(publisher, await playOf(tune))
    const audited = await open(auditor, await playOf(tune))
    const forPublisher = await publisher.client.json(listDisputes, { query: { pageSize: '200' } })
    const ids = forPublisher.items.map(({ id }) => id)
    expect(ids).toContain(theirs.id)
    expect(ids).not.toContain(audited.id)
    const forClerk = await clerk.client.json(listDisputes, {
      query: { status: 'open', sort: '-number', pageSize: '2' },
    })
    expect(forClerk.items.map(({ id }) => id)).toEqual([audited.id, theirs.id])
    for (const endpoint of [getDispute, replyToDispute]) {
      const problem = await publisher.client.problem(endpoint, {
        params: { disputeId: audited.id },
        ...(endpoint === replyToDispute ? { body: { text: 'Hello' } } : {}),
      })
      expect(problem).toMatchObject({ status: 404 })
    }
  })
})

describe('a dispute', () => {
  it('is answered; what a clerk writes reaches its opener by mail', async () => {
    const person = await api.signInAs('publisher', { partyIds: [party.id] })
    const { id } = await open(person, await playOf(tune))
    await person.client.json(replyToDispute, { params: { disputeId: id }, body: { text: 'Any news?' } })
    expect(await mailTo(person.user.email)).toEqual([])
    const view = await clerk.client.json(replyToDispute, {
      params: { disputeId: id },
      body: { text: 'We will listen\nto it.' },
    })
    expect(view.messages.map(({ authorRole, text }) => [authorRole, text])).toEqual([
      ['publisher', 'Any news?'],
      ['clerk', 'We will listen\nto it.'],
    ])
    expect(view.canDecide).toBe(true)
    expect((await mailTo(person.user.email)).map(({ body }) => body)).toEqual([
      expect.stringContaining('We will listen\nto it.'),
    ])
  })

  it('upheld takes the play out of its open month, with event, reason and mail', async () => {
    const playId = await playOf(tune)
    const person = await api.signInAs('auditor')
    const { id, number } = await open(person, playId)
    const view = await clerk.client.json(decideDispute, decide(id, 'upheld', 'It is a jingle.'))
    expect(view).toMatchObject({
      status: 'upheld',
      decisionReason: 'It is a jingle.',
      decidedByName: 'Test clerk',
      play: { status: 'removed' },
      canReply: false,
      canDecide: false,
    })
    expect(await statusOfPlay(playId)).toBe('removed')
    const events: { kind: string; reason: string | null; actorUserId: string | null }[] = await api
      .database('play_events')
      .where({ play_id: playId })
      .orderBy('id')
      .select('kind', 'reason', { actorUserId: 'actor_user_id' })
    expect(events[1]).toEqual({
      kind: 'removed',
      reason: `Dispute ${number} upheld: It is a jingle.`,
      actorUserId: clerk.user.userId,
    })
    expect((await mailTo(person.user.email)).map(({ subject }) => subject)).toEqual([
      `Dispute ${number} upheld`,
    ])
    const reply = { params: { disputeId: id }, body: { text: 'Thank you' } }
    expect(await person.client.problem(replyToDispute, reply)).toMatchObject({
      code: 'conflict',
      detail: `Dispute ${number} is upheld already.`,
    })
  })

  it('dismissed leaves the play counted, and the play may be disputed again', async () => {
    const playId = await playOf(tune)
    const { id } = await open(auditor, playId)
    await clerk.client.json(decideDispute, decide(id, 'dismissed'))
    expect(await statusOfPlay(playId)).toBe('counted')
    expect(await open(auditor, playId, 'Listen once more.')).toMatchObject({ status: 'open' })
  })

  it('is decided once, also when two clerks decide at once', async () => {
    const playId = await playOf(tune)
    const { id } = await open(auditor, playId)
    const second = await api.signInAs('clerk')
    const answers = await Promise.all([
      clerk.client.call(decideDispute, decide(id, 'upheld')),
      second.client.call(decideDispute, decide(id, 'dismissed')),
    ])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    const { status } = await clerk.client.json(getDispute, { params: { disputeId: id } })
    expect(await statusOfPlay(playId)).toBe(status === 'upheld' ? 'removed' : 'counted')
  })

  it('is decided by clerks alone', async () => {
    const { id } = await open(auditor, await playOf(tune))
    expect((await auditor.client.problem(decideDispute, decide(id, 'upheld'))).code).toBe('not-allowed')
  })
})

describe('a dispute in a month that is not open', () => {
  it.each([
    ['2026-04', 'calculated', 'Return it to open first.'],
    ['2026-05', 'approved', 'Return it to open first.'],
    ['2026-06', 'issued', 'A correction belongs to a later month and cannot be booked in this version.'],
  ] as const)('cannot be upheld: %s is %s', async (month, status, advice) => {
    const playId = await playOf(tune, month)
    await setMonth(month, status)
    const { id, isMonthOpen } = await open(auditor, playId)
    expect(isMonthOpen).toBe(false)
    const problem = await clerk.client.problem(decideDispute, decide(id, 'upheld'))
    expect(problem).toMatchObject({ status: 409, code: 'month-closed' })
    expect(problem.detail).toContain(advice)
    expect(await clerk.client.json(getDispute, { params: { disputeId: id } })).toMatchObject({
      status: 'open',
      play: { status: 'counted' },
    })
    expect(await clerk.client.json(decideDispute, decide(id, 'dismissed'))).toMatchObject({
      status: 'dismissed',
    })
  })
})
