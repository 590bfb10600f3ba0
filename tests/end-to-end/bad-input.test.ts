import { writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { expect as expectPage } from 'playwright/test'
import { beforeAll, describe, expect, it } from 'vitest'
import { toneWave } from '../integration/feature-data.ts'
import { buildLog } from '../factories/build-log.ts'
import { buildStation, type BuiltStation } from '../factories/build-station.ts'
import { temporaryDirectory } from '../support/index.ts'
import type { TestApi, TestUser } from '../support/test-api.ts'
import { chosenFile, openLogUpload, sendLog } from './pages/logs.ts'
import { fillInSignIn, signIn } from './pages/sign-in.ts'
import { openVisit, type Visit } from './support/browser.ts'
import { STATION_ZONE, startProduct } from './support/desk.ts'

/** What people get wrong, and the words that meet them at the very place. */
let api: TestApi
let station: BuiltStation
let uploader: TestUser
let clerk: TestUser
let directory: string

beforeAll(async () => {
  api = await startProduct()
  station = await buildStation(api.database, { name: 'Brook FM', timeZone: STATION_ZONE })
  await buildLog(api.database, { station, startedAt: '2026-03-14T12:00:00Z', seconds: 3600 })
  uploader = await api.createUser('uploader', { stationIds: [station.id] })
  clerk = await api.createUser('clerk')
  directory = await temporaryDirectory('files')
})

async function visitOf(user: TestUser): Promise<Visit> {
  const visit = await openVisit({ baseUrl: api.url })
  await signIn(visit.page, user)
  return visit
}

async function fileNamed(name: string, content: string | Uint8Array): Promise<string> {
  const path = join(directory, name)
  await writeFile(path, content)
  return path
}

describe('signing in', () => {
  it('with a wrong password is refused in words above the button, and the address stays filled in', async () => {
    const visit = await openVisit({ baseUrl: api.url })
    visit.provoke(401)
    await visit.page.goto('/sign-in')
    await fillInSignIn(visit.page, uploader.email, 'not my password')
    await expectPage(visit.page.getByRole('alert')).toContainText('E-mail address or password is not right')
    await expectPage(visit.page.getByLabel('E-mail address')).toHaveValue(uploader.email)
    expect(visit.mishaps()).toEqual([])
  })

  it('without an address is refused at the field, before anything is sent', async () => {
    const visit = await openVisit({ baseUrl: api.url })
    await visit.page.goto('/sign-in')
    await fillInSignIn(visit.page, '', 'a password')
    await expectPage(visit.page.getByLabel('E-mail address')).toHaveAccessibleDescription(
      /Enter an e-mail address/,
    )
    expect(visit.mishaps()).toEqual([])
  })
})

describe('sending a station log', () => {
  it('that is a text named .mp3 is refused in its row', async () => {
    const visit = await visitOf(uploader)
    visit.provoke(422)
    await openLogUpload(visit.page)
    const path = await fileNamed('morning.mp3', 'These are the minutes of the meeting. '.repeat(100))
    await sendLog(visit.page, { path, startedAtLocal: '2026-03-15T09:00:00' })
    await expectPage(chosenFile(visit.page).getByRole('alert')).toContainText(
      '“morning.mp3” is a text, not audio',
    )
    await expectPage(visit.page.getByLabel('Recording begins')).toHaveValue(/^2026-03-15T09:00/)
    expect(visit.mishaps()).toEqual([])
  })

  it('within airtime that is held is refused in its row, naming what is held', async () => {
    const visit = await visitOf(uploader)
    visit.provoke(409)
    await openLogUpload(visit.page)
    const path = await fileNamed('tone.wav', new Uint8Array(await toneWave(20, 440).arrayBuffer()))
    await sendLog(visit.page, { path, startedAtLocal: '2026-03-14T09:30:00' })
    const row = chosenFile(visit.page)
    await expectPage(row.getByRole('alert')).toContainText('This recording overlaps one that is held')
    await expectPage(row.getByRole('alert')).toContainText('log.mp3 of Brook FM')
    // Corrected at the place, it goes.
    await visit.page.getByLabel('Recording begins').fill('2026-03-14T10:00:00')
    await visit.page.getByRole('button', { name: 'Send 1 file' }).click()
    await expectPage(row).toContainText('Arrived')
    expect(visit.mishaps()).toEqual([])
  })

  it('without a start is refused at the field', async () => {
    const visit = await visitOf(uploader)
    await openLogUpload(visit.page)
    const path = await fileNamed('beep.wav', new Uint8Array(await toneWave(5, 880).arrayBuffer()))
    await sendLog(visit.page, { path, startedAtLocal: '' })
    await expectPage(visit.page.getByLabel('Recording begins')).toHaveAccessibleDescription(
      /Enter the date and time/,
    )
    expect(visit.mishaps()).toEqual([])
  })
})

describe('importing a catalogue', () => {
  it('with bad rows takes the good ones and says what is wrong with each of the others', async () => {
    const visit = await visitOf(clerk)
    const { page } = visit
    await page.goto('/imports/new')
    const rows = [
      'isrc,title,artist,duration,work_iswc,work_title,right,party_ipi,party_name,share_percent,valid_from,valid_to',
      'ZZTST2600901,Good one,The Sedges,,,,recordings,,Alder Songs,100,2020-01-01,',
      'ZZ-BAD,Bad code,The Sedges,,,,,,,,,',
      'ZZTST2600902,,The Sedges,,,,,,,,,',
    ]
    await page.getByLabel('CSV file').setInputFiles(await fileNamed('catalogue.csv', rows.join('\r\n')))
    await page.getByRole('button', { name: 'Import the file' }).click()
    await page.getByRole('heading', { name: /catalogue\.csv/, level: 1 }).waitFor()
    const report = page.getByRole('table').last()
    await expectPage(report.getByRole('row').filter({ hasText: 'ZZ-BAD' })).toContainText(/Refused/)
    await expectPage(report.getByRole('row').filter({ hasText: 'ZZ-BAD' })).toContainText(/ISRC/)
    expect(visit.mishaps()).toEqual([])
  })

  it('from a file that is no CSV is refused at the field', async () => {
    const visit = await visitOf(clerk)
    visit.provoke(422)
    await visit.page.goto('/imports/new')
    await visit.page
      .getByLabel('CSV file')
      .setInputFiles(await fileNamed('picture.csv', new Uint8Array([0x89, 0x50, 0x4e, 0x47, 0, 0, 0, 0])))
    await visit.page.getByRole('button', { name: 'Import the file' }).click()
    await expectPage(visit.page.getByLabel('CSV file')).toHaveAccessibleDescription(/\w+ .*\./)
    expect(visit.mishaps()).toEqual([])
  })
})
