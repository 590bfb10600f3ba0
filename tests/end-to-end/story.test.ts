import { join } from 'node:path'
import { renderDemoLog, type DemoLogTruth } from '@fieldfare/audio'
import { listStatements } from '@fieldfare/contracts'
import { expect as expectPage } from 'playwright/test'
import type { Page } from 'playwright'
import { beforeAll, describe, expect, it } from 'vitest'
import type { TestUser } from '../support/test-api.ts'
import { startTestWorker } from '../support/test-worker.ts'
import {
  approveMonth,
  calculateMonth,
  issueMonth,
  openDistribution,
  expectState,
} from './pages/distribution.ts'
import { disputePlay, openDispute, upholdDispute } from './pages/disputes.ts'
import { chosenFile, followAnalysis, listedDetections, openLogUpload, sendLog } from './pages/logs.ts'
import { goTo, signIn, signOut } from './pages/sign-in.ts'
import { downloadCsvRows, downloadPdfText, listedStatements } from './pages/statements.ts'
import { openVisit, type Visit } from './support/browser.ts'
import {
  fingerprintRecordings,
  openDesk,
  SAMPLE_RATE_HZ,
  startProduct,
  tuneOf,
  type Desk,
} from './support/desk.ts'
import { clockAt, momentAt, monthInWords, monthsOfStory } from './support/months.ts'

/**
 * The main job from a station's recording to a publisher's statement, in browsers, by everybody concerned, in the order
 * in which it happens: each part goes on from where the one before left the desk.
 */
const months = monthsOfStory()
const CLOSING_LOG_STARTS = `${months.closing}-14T09:30:00`
const OPEN_LOG_STARTS = `${months.open}-01T00:00:00`
const FIRST_TITLE = 'Morning Tide'
const SECOND_TITLE = 'Morning Tide, at dusk'

let desk: Desk
let people: Record<'uploader' | 'calculatingClerk' | 'approvingClerk' | 'publisher' | 'auditor', TestUser>
let closingTruth: DemoLogTruth
const visits: Visit[] = []

async function open(user: TestUser): Promise<Page> {
  const visit = await openVisit({ baseUrl: desk.api.url })
  visits.push(visit)
  await signIn(visit.page, user)
  return visit.page
}

/** A minute of each recording and half a minute that no catalogue holds, parted by silence. */
function renderClosingLog(path: string): Promise<DemoLogTruth> {
  const [first, second] = desk.recordings
  const pause = { kind: 'silence', seconds: 4 } as const
  const items = [
    { kind: 'tune', label: FIRST_TITLE, samples: first.tune, toSeconds: 60 },
    pause,
    { kind: 'tune', label: 'unknown', samples: tuneOf(103), toSeconds: 30 },
    pause,
    { kind: 'tune', label: SECOND_TITLE, samples: second.tune, fromSeconds: 10, toSeconds: 55 },
  ] as const
  return renderDemoLog(path, { sampleRateHz: SAMPLE_RATE_HZ, items }, { format: 'mp3', bitRate: 64_000 })
}

function renderOpenLog(path: string): Promise<DemoLogTruth> {
  const [first] = desk.recordings
  const items = [
    { kind: 'silence', seconds: 3 },
    { kind: 'tune', label: FIRST_TITLE, samples: first.tune, fromSeconds: 5, toSeconds: 50 },
  ] as const
  return renderDemoLog(path, { sampleRateHz: SAMPLE_RATE_HZ, items }, { format: 'mp3', bitRate: 64_000 })
}

beforeAll(async () => {
  const api = await startProduct()
  desk = await openDesk(api)
  await fingerprintRecordings(desk)
  people = {
    uploader: await api.createUser('uploader', { stationIds: [desk.station.id] }),
    calculatingClerk: await api.createUser('clerk'),
    approvingClerk: await api.createUser('clerk'),
    publisher: await api.createUser('publisher', { partyIds: [desk.publisher.id] }),
    auditor: await api.createUser('auditor'),
  }
  closingTruth = await renderClosingLog(join(desk.directory, 'morning.mp3'))
  await renderOpenLog(join(desk.directory, 'night.mp3'))
})

describe('an uploader', () => {
  it('sends a recording and watches it being analysed', async () => {
    const page = await open(people.uploader)
    await openLogUpload(page)
    await sendLog(page, { path: join(desk.directory, 'morning.mp3'), startedAtLocal: CLOSING_LOG_STARTS })
    await expectPage(chosenFile(page)).toContainText('Arrived')
    await followAnalysis(page)
    // No worker runs yet, so the log is certain to be seen waiting, and then at work, without loading the page anew.
    await expectPage(page.getByText('Waiting for its turn')).toBeVisible()
    await startTestWorker(desk.api)
    await expectPage(page.getByText('Listening for recordings')).toBeVisible({ timeout: 30_000 })
    await expectPage(page.getByText('Analysed', { exact: true }).first()).toBeVisible({ timeout: 60_000 })
    await openLogUpload(page)
    await sendLog(page, { path: join(desk.directory, 'night.mp3'), startedAtLocal: OPEN_LOG_STARTS })
    await followAnalysis(page)
    await expectPage(page.getByText('Analysed', { exact: true }).first()).toBeVisible({ timeout: 60_000 })
  })
})

describe('a clerk', () => {
  it('sees what was played, at the station’s time, and how often in the month', async () => {
    const page = await open(people.calculatingClerk)
    await page.goto(`/detections?month=${months.closing}&sort=startedAt`)
    const listed = await listedDetections(page)
    const expected = closingTruth.plays.filter(({ label }) => label !== 'unknown')
    expect(listed).toHaveLength(expected.length)
    for (const [index, play] of expected.entries()) {
      const row = listed[index]
      expect(row?.title).toContain(play.label)
      const moment = momentAt(CLOSING_LOG_STARTS, play.startSeconds).getTime()
      expect(Math.abs(Date.parse(row?.startedAt ?? '') - moment)).toBeLessThan(1000)
      // The clock is cut to seconds, so a second either way may stand there.
      const clocks = [-1, 0, 1].map((off) => clockAt(CLOSING_LOG_STARTS, play.startSeconds + off))
      expect(clocks).toContain(row?.clock)
    }
    await page.goto(`/?month=${months.closing}`)
    const station = page
      .getByRole('table', { name: 'Plays and airtime by station' })
      .getByRole('row', { name: /Brook FM/ })
    await expectPage(station.locator('a[href^="/plays?"]')).toHaveText(String(expected.length))
  })

  it('calculates the month but cannot approve it as well', async () => {
    const page = await open(people.calculatingClerk)
    await page.goto(`/distributions/${months.closing}`)
    await calculateMonth(page)
    await expectState(page, 'Calculated')
    await expectPage(page.getByRole('button', { name: 'Approve', exact: true })).toBeDisabled()
    await expectPage(page.getByText('another clerk must approve it')).toBeVisible()
  })

  it('approves what a colleague calculated, and issues the statements', async () => {
    const page = await open(people.approvingClerk)
    await openDistribution(page, months.closing)
    await approveMonth(page, months.closing)
    await expectState(page, 'Approved')
    await issueMonth(page, months.closing)
    await expectState(page, 'Issued')
  })
})

/*
 * By hand: Brook FM pays 1,000.00 for the month, in full. The rules deduct
 * 12.5 % for administration (125.00) and 2 % for a social fund (20.00), so 855.00 is net. Half of it,
 * 427.50, is for works. Every play of the month is of one work, Morning Tide, however long each was, so all 427.50 is
 * its amount; the publisher's 60 % of it is 256.50. The publisher holds no recording.
 */
const PUBLISHER_TOTAL = '256.50'

describe('a publisher', () => {
  it('reads their own statement and no other', async () => {
    const page = await open(people.publisher)
    const listed = await listedStatements(page)
    expect(listed).toHaveLength(1)
    expect(listed[0]).toContain('Alder Songs')
    expect(listed[0]).toContain(PUBLISHER_TOTAL)
    const clerk = await desk.api.signInAs('clerk')
    const { items } = await clerk.client.json(listStatements, { query: { month: months.closing } })
    const other = items.find(({ party }) => party.id === desk.coPublisher.id)
    visits.at(-1)?.provoke(404)
    await page.goto(`/statements/${other?.id ?? ''}`)
    await expectPage(page.getByText(other?.number ?? '')).toHaveCount(0)
    await expectPage(page.getByText(/not found|does not exist|no page here/i).first()).toBeVisible()
  })

  it('downloads it as PDF and as CSV, and both come to the sum worked out by hand', async () => {
    const page = await open(people.publisher)
    await page.getByRole('rowheader').getByRole('link').click()
    await page.getByRole('heading', { name: `Statement for ${monthInWords(months.closing)}` }).waitFor()
    const pdf = await downloadPdfText(page)
    expect(/^\s*Attributed to you\s+(\S+)\s*$/m.exec(pdf)?.[1]).toBe(PUBLISHER_TOTAL)
    expect(pdf).toContain('Alder Songs')
    expect(pdf).toMatch(/Page 1 of \d/)
    const csv = await downloadCsvRows(page)
    const amountOf = (record: string) =>
      csv.filter((row) => row['record'] === record).map((row) => row['amount'])
    expect(amountOf('net')).toEqual([PUBLISHER_TOTAL])
    expect(csv.filter((row) => row['record'] === 'play')).toHaveLength(2)
    const lines = amountOf('line').map((amount) => Math.round(Number(amount) * 100))
    expect(lines.reduce((sum, minor) => sum + minor, 0)).toBe(25_650)
  })

  it('is signed out at once, in every window', async () => {
    const page = await open(people.publisher)
    const otherWindow = await page.context().newPage()
    await otherWindow.goto('/statements')
    await otherWindow.getByRole('heading', { name: 'Statements', level: 1 }).waitFor()
    const cookies = await page.context().cookies()
    await signOut(page)
    await otherWindow.reload()
    await otherWindow.getByRole('heading', { name: 'Sign in', level: 1 }).waitFor()
    // Somebody who kept a copy of the cookies is out as well.
    const cookie = cookies.map(({ name, value }) => `${name}=${value}`).join('; ')
    const answer = await fetch(`${desk.api.url}/api/statements`, { headers: { cookie } })
    expect(answer.status).toBe(401)
  })
})

describe('the sums of the month', () => {
  it('close over everybody, and recordings earn by the seconds they were heard', async () => {
    const { client } = await desk.api.signInAs('clerk')
    const { items } = await client.json(listStatements, { query: { month: months.closing } })
    const netOf = (party: { id: string }) => Number(items.find((one) => one.party.id === party.id)?.netMinor)
    expect(netOf(desk.publisher)).toBe(25_650)
    expect(items.reduce((sum, one) => sum + Number(one.netMinor), 0)).toBe(85_500)
    // 427.50 for recordings over 60 s of the label's and 45 s of the co-publisher's; each end may be 1 s off.
    const exact = (42_750 * 60) / 105
    expect(Math.abs(netOf(desk.label) - exact) / exact).toBeLessThan(2 / 45)
  })
})

describe('an auditor', () => {
  it('disputes a play of the open month', async () => {
    const page = await open(people.auditor)
    await page.goto(`/detections?month=${months.open}`)
    await page.getByRole('rowheader').getByRole('link').first().click()
    await disputePlay(page, 'This is the neighbour’s cover version, not the recording.')
    await expectPage(page.getByText('Open', { exact: true }).first()).toBeVisible()
  })

  it('is proved right by the clerk, and the play is removed', async () => {
    const page = await open(people.approvingClerk)
    await openDispute(page)
    await upholdDispute(page, 'The voice is another one.')
    await expectPage(page.getByText('Upheld', { exact: true }).first()).toBeVisible()
    await goTo(page, 'Plays')
    await page.goto(`/plays?month=${months.open}`)
    await expectPage(page.getByRole('table').getByText('Removed', { exact: true })).toHaveCount(1)
    await page.goto(`/?month=${months.open}`)
    const station = page
      .getByRole('table', { name: 'Plays and airtime by station' })
      .getByRole('row', { name: /Brook FM/ })
    await expectPage(station.locator('a[href^="/plays?"]')).toHaveText('0')
  })
})

describe('the browsers of all of them', () => {
  it('met no error, no exception and no failed request', () => {
    expect(visits).toHaveLength(9)
    expect(visits.flatMap(({ mishaps }) => mishaps())).toEqual([])
  })
})
