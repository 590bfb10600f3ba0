import {
  approveDistribution,
  calculateDistribution,
  getDistribution,
  issueDistribution,
  jobIdSchema,
  listDistributions,
  reopenDistribution,
} from '@fieldfare/contracts'
import { claimJob, failJob, markDistributionFailed } from '@fieldfare/database'
import { beforeAll, describe, expect, it } from 'vitest'
import {
  buildParty,
  buildRecording,
  type BuiltParty,
  type BuiltRecording,
} from '../factories/build-catalogue.ts'
import { buildDistribution, type BuiltDistribution } from '../factories/build-distribution.ts'
import { buildLog } from '../factories/build-log.ts'
import { buildPlay } from '../factories/build-play.ts'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { startTestApi, type SignedInClient, type TestApi } from '../support/test-api.ts'

let api: TestApi
let first: SignedInClient
let second: SignedInClient
let station: BuiltStation
let tune: BuiltRecording
let party: BuiltParty

beforeAll(async () => {
  api = await startTestApi()
  station = await buildStation(api.database, { callName: 'MAIN' })
  party = await buildParty(api.database, 'Label')
  tune = await buildRecording(api.database, {
    title: 'Tune',
    shares: [{ party, sharePpm: 400_000 }],
  })
  first = await api.signInAs('clerk')
  second = await api.signInAs('clerk')
})

const at = (month: string) => ({ params: { month } })

/** A month with one play that the first clerk has had calculated. */
async function calculated(month: string): Promise<BuiltDistribution> {
  const play = await buildPlay(api.database, { station, recording: tune, startedAt: `${month}-03T10:00:00Z` })
  return buildDistribution(api.database, {
    month,
    requestedBy: first.user.userId,
    station,
    recording: tune,
    play,
    parties: [party],
  })
}

async function runsOf(month: string): Promise<{ run: number; status: string }[]> {
  const rows: { run: number; status: string }[] = await api
    .database('distributions')
    .where({ month: `${month}-01` })
    .orderBy('run')
    .select('run', 'status')
  return rows
}

describe('calculating a month', () => {
  it('asks a worker for a run with the rules of the month, all in one', async () => {
    const view = await first.client.json(calculateDistribution, at('2026-01'))
    expect(view).toMatchObject({
      status: 'calculating',
      run: 1,
      ruleVersion: '1',
      digest: null,
      stations: [],
    })
    expect(view.steps.calculate).toEqual({ allowed: false, reason: 'The month is being calculated.' })
    const jobs: { payload: unknown; dedupeKey: string }[] = await api
      .database('jobs')
      .where({ kind: 'calculate-distribution' })
      .select('payload', { dedupeKey: 'dedupe_key' })
    expect(jobs).toEqual([
      { payload: { distributionId: view.id }, dedupeKey: `calculate-distribution-${view.id}` },
    ])
    const trail: { action: string }[] = await api
      .database('audit_events')
      .where({ subject_id: view.id })
      .select('action')
    expect(trail).toMatchObject([{ action: 'calculate-distribution' }])
  })

  it('again at once is refused', async () => {
    expect(await second.client.problem(calculateDistribution, at('2026-01'))).toMatchObject({ status: 409 })
    expect(await runsOf('2026-01')).toEqual([{ run: 1, status: 'calculating' }])
  })

  it('that failed shows why and can be asked for again', async () => {
    const { id } = await first.client.json(getDistribution, at('2026-01'))
    if (id === null) throw new Error('The run has no id')
    await api.database.transaction((trx) => markDistributionFailed(trx, id, 'The sums did not close.'))
    const failed = await first.client.json(getDistribution, at('2026-01'))
    expect(failed).toMatchObject({ status: 'open', failure: 'The sums did not close.' })
    expect(failed.steps.calculate.allowed).toBe(true)
    const again = await first.client.json(calculateDistribution, at('2026-01'))
    expect(again).toMatchObject({ status: 'calculating', run: 2, failure: null })
    expect(await runsOf('2026-01')).toEqual([
      { run: 1, status: 'failed' },
      { run: 2, status: 'calculating' },
    ])
  })

  it('withdraws the run before', async () => {
    await calculated('2026-02')
    expect(await first.client.json(calculateDistribution, at('2026-02'))).toMatchObject({ run: 2 })
    expect(await runsOf('2026-02')).toEqual([
      { run: 1, status: 'withdrawn' },
      { run: 2, status: 'calculating' },
    ])
  })

  it('waits for logs that are still in work, and says how many', async () => {
    await buildLog(api.database, { station, startedAt: '2026-03-04T00:00:00Z', status: 'queued' })
    await buildLog(api.database, { station, startedAt: '2026-02-28T20:00:00Z', status: 'analysing' })
    const problem = await first.client.problem(calculateDistribution, at('2026-03'))
    expect(problem).toMatchObject({
      status: 409,
      detail: '2 station logs of the month are still being analysed.',
    })
    expect(await runsOf('2026-03')).toEqual([])
  })

  it('waits until the month is over', async () => {
    const view = await first.client.json(getDistribution, at('2099-01'))
    expect(view.steps.calculate).toEqual({
      allowed: false,
      reason: 'The month is not over at every station yet.',
    })
    expect(await first.client.problem(calculateDistribution, at('2099-01'))).toMatchObject({ status: 409 })
  })

  it('by two clerks at once makes one run', async () => {
    const answers = await Promise.all(
      [first, second].map(({ client }) => client.call(calculateDistribution, at('2025-12'))),
    )
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(await runsOf('2025-12')).toHaveLength(1)
  })

  it('is for clerks; auditors may look', async () => {
    const auditor = await api.signInAs('auditor')
    expect((await auditor.client.problem(calculateDistribution, at('2026-01'))).code).toBe('not-allowed')
    const view = await auditor.client.json(getDistribution, at('2026-01'))
    expect(view.steps.reopen).toEqual({ allowed: false, reason: 'Clerks take this step.' })
  })
})

describe('a calculated month', () => {
  it('shows every level of its sums', async () => {
    const run = await calculated('2026-04')
    const view = await second.client.json(getDistribution, at('2026-04'))
    expect(view).toMatchObject({
      id: run.id,
      digest: run.digest,
      status: 'calculated',
      currency: 'EUR',
      feeMinor: '600',
      netMinor: '400',
      allocatedMinor: '300',
      heldBackMinor: '100',
      payees: 1,
      plays: 1,
      calculatedByName: 'Test clerk',
    })
    expect(view.stations).toMatchObject([
      {
        station: { callName: 'MAIN' },
        heldSeconds: 3600,
        expectedSeconds: 7200,
        feeMinor: '600',
        netMinor: '400',
        deductions: [{ code: 'administration', label: 'Administration', amountMinor: '200' }],
        // 400 minor units for 180 seconds are 8,000 an hour.
        pools: [{ right: 'recordings', poolMinor: '400', creditedSeconds: 180, perHourMinor: '8000' }],
      },
    ])
    expect(view.holdbacks).toMatchObject([{ subject: 'Tune', amountMinor: '100' }])
    expect(view.payeeTotals).toEqual([
      { party: { id: party.id, name: 'Label' }, amountMinor: '300', statementId: run.statements[0]?.id },
    ])
  })

  it('names what a careful person would settle first', async () => {
    await buildLog(api.database, { station, startedAt: '2026-04-10T00:00:00Z', status: 'failed' })
    const { cautions } = await second.client.json(getDistribution, at('2026-04'))
    expect(cautions).toEqual([
      'MAIN: logs cover 0.1 % of the month.',
      '1 station log could not be analysed.',
      '1 recording was played whose shares do not come to 100 %; what nobody can claim is held back.',
    ])
  })

  it('is listed with its sums, newest first', async () => {
    const { items } = await first.client.json(listDistributions)
    const months = items.map(({ month }) => month)
    expect(months).toEqual([...months].sort().reverse())
    expect(items.find(({ month }) => month === '2026-04')).toMatchObject({
      status: 'calculated',
      netMinor: '400',
    })
  })

  it('is never approved by the clerk who calculated it', async () => {
    const run = await calculated('2026-05')
    const view = await first.client.json(getDistribution, at('2026-05'))
    expect(view.steps.approve).toEqual({
      allowed: false,
      reason: 'You calculated this month yourself; another clerk must approve it.',
    })
    const problem = await first.client.problem(approveDistribution, {
      ...at('2026-05'),
      body: { digest: run.digest },
    })
    expect(problem).toMatchObject({ code: 'second-person-needed', status: 403 })
    expect(await runsOf('2026-05')).toEqual([{ run: 1, status: 'calculated' }])
  })

  it('is not approved unseen: the digest must be the one calculated last', async () => {
    const problem = await second.client.problem(approveDistribution, {
      ...at('2026-05'),
      body: { digest: 'a'.repeat(64) },
    })
    expect(problem).toMatchObject({ code: 'conflict' })
    expect(problem.detail).toContain('calculated again since you looked')
  })

  it('goes one way when one clerk approves while another reopens', async () => {
    const run = await calculated('2026-06')
    const third = await api.signInAs('clerk')
    const answers = await Promise.all([
      second.client.call(approveDistribution, { ...at('2026-06'), body: { digest: run.digest } }),
      third.client.call(approveDistribution, { ...at('2026-06'), body: { digest: run.digest } }),
    ])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409])
    const reopenings = await Promise.all(
      [second, third].map(({ client }) =>
        client.call(reopenDistribution, { ...at('2026-06'), body: { reason: 'A share was wrong.' } }),
      ),
    )
    expect(reopenings.map(({ status }) => status).sort()).toEqual([200, 409])
    expect(await runsOf('2026-06')).toEqual([{ run: 1, status: 'withdrawn' }])
    const view = await second.client.json(getDistribution, at('2026-06'))
    expect(view).toMatchObject({ status: 'open', id: null, digest: null, payeeTotals: [] })
  })

  it('is returned to open only with a reason', async () => {
    const problem = await second.client.problem(reopenDistribution, {
      ...at('2026-05'),
      body: { reason: 'no' },
    })
    expect(problem.fieldErrors.map(({ path }) => path)).toEqual(['reason'])
  })
})

describe('an approved month', () => {
  it('is issued by a worker, and then stays as it is', async () => {
    const run = await calculated('2026-07')
    await second.client.json(approveDistribution, { ...at('2026-07'), body: { digest: run.digest } })
    expect(await first.client.problem(calculateDistribution, at('2026-07'))).toMatchObject({ status: 409 })
    const issuing = await first.client.json(issueDistribution, at('2026-07'))
    expect(issuing).toMatchObject({ status: 'issuing', approvedByName: 'Test clerk', cautions: [] })
    expect(issuing.steps.issue.allowed).toBe(false)
    await api
      .database('distributions')
      .where({ id: run.id })
      .update({ status: 'issued', issued_at: api.database.fn.now() })
    await api.database('distribution_months').where({ month: '2026-07-01' }).update({ status: 'issued' })
    const problem = await second.client.problem(reopenDistribution, {
      ...at('2026-07'),
      body: { reason: 'Too late for this.' },
    })
    expect(problem).toMatchObject({
      status: 409,
      detail: 'The month is issued and does not change any more.',
    })
  })

  it('whose statements could not be made says why, and they can be asked for again', async () => {
    const run = await calculated('2026-08')
    await second.client.json(approveDistribution, { ...at('2026-08'), body: { digest: run.digest } })
    await first.client.json(issueDistribution, at('2026-08'))
    const job: { id: string } | undefined = await api
      .database('jobs')
      .where({ dedupe_key: `render-statements-${run.id}` })
      .first('id')
    const jobId = jobIdSchema.parse(job?.id)
    await claimJob(api.database, jobId, 'test-worker')
    await failJob(api.database, jobId, 'test-worker', 'The storage is full.')
    const view = await first.client.json(getDistribution, at('2026-08'))
    expect(view).toMatchObject({ status: 'issuing', failure: 'The storage is full.' })
    expect(view.steps.issue.allowed).toBe(true)
    expect(await first.client.json(issueDistribution, at('2026-08'))).toMatchObject({ failure: null })
    expect(await first.client.problem(issueDistribution, at('2026-08'))).toMatchObject({ status: 409 })
    const waiting: { status: string }[] = await api.database('jobs').where({ id: jobId }).select('status')
    expect(waiting).toEqual([{ status: 'waiting' }])
  })

  it('is the only one that can be issued', async () => {
    expect(await first.client.problem(issueDistribution, at('2026-05'))).toMatchObject({
      status: 409,
      detail: 'The month is not approved yet.',
    })
    expect(await first.client.problem(issueDistribution, at('2025-11'))).toMatchObject({
      detail: 'The month has not been calculated yet.',
    })
  })
})
