import { expect as expectPage } from 'playwright/test'
import { beforeAll, describe, expect, it } from 'vitest'
import { expectLoaded, seriousFindings, sidewaysPixels } from './pages/any-page.ts'
import { openVisit } from './support/browser.ts'
import { openFurnishedDesk, type DeskRole, type FurnishedDesk } from './support/furnished-desk.ts'

/**
 * Every main page of every role, filled: nothing that axe calls serious or critical in light or dark, no sideways
 * scrolling on a narrow phone, no error in the console; and the whole of it by keyboard where that is easily lost.
 */
type Address = `/${string}` | keyof FurnishedDesk['addresses']

const airtime: readonly Address[] = [
  '/stations',
  'station',
  'stationDay',
  '/logs',
  'log',
  '/detections',
  '/plays',
]
const catalogue: readonly Address[] = ['/recordings', 'recording', '/works', 'work', '/parties', 'party']
const money: readonly Address[] = ['/statements', 'statement', 'statementLine', '/disputes', 'dispute']

const pagesOf: Record<DeskRole, readonly Address[]> = {
  uploader: ['/logs', 'log', '/logs/new', 'detection', '/account'],
  clerk: [
    '/',
    ...airtime,
    'waitingDetection',
    ...catalogue,
    '/recordings/new',
    '/recordings/reference-audio',
    '/imports',
    '/imports/new',
    '/distributions',
    'distribution',
    ...money,
  ],
  publisher: ['/statements', 'statement', 'statementLine', '/plays', '/recordings'],
  auditor: ['/', 'detection', '/plays', 'distribution', 'dispute'],
  admin: ['/system', '/users', 'user', '/users/new', '/stations', '/stations/new', '/inbox', '/audit-trail'],
}
const openPages: readonly Address[] = ['/sign-in', '/forgotten-password', '/there-is-no-such-page']

const WIDE = { width: 1280, height: 900 }
const NARROW = { width: 360, height: 740 }

let desk: FurnishedDesk

beforeAll(async () => {
  desk = await openFurnishedDesk()
})

function isPath(address: Address): address is `/${string}` {
  return address.startsWith('/')
}

async function inspect(role: DeskRole | null, addresses: readonly Address[]): Promise<string[]> {
  const client = role === null ? {} : { client: desk.people[role].client }
  const visit = await openVisit({ baseUrl: desk.api.url, ...client })
  const { page } = visit
  const findings: string[] = []
  for (const address of addresses) {
    await page.emulateMedia({ colorScheme: 'light' })
    await page.setViewportSize(WIDE)
    await page.goto(isPath(address) ? address : desk.addresses[address])
    await expectLoaded(page)
    for (const scheme of ['light', 'dark'] as const) {
      for (const finding of await seriousFindings(page, scheme)) findings.push(`${address}, ${finding}`)
    }
    await page.setViewportSize(NARROW)
    const sideways = await sidewaysPixels(page)
    if (sideways > 0) findings.push(`${address}: ${sideways} pixels wider than a narrow phone`)
  }
  return [...findings, ...visit.mishaps()]
}

describe('the pages of', () => {
  it.each(Object.entries(pagesOf))(
    '%s are usable by everybody, in light and dark, wide and narrow',
    async (role, addresses) => {
      const person = Object.keys(desk.people).find((name): name is DeskRole => name === role)
      expect(await inspect(person ?? null, addresses)).toEqual([])
    },
  )

  it('somebody who is not signed in are as well', async () => {
    expect(await inspect(null, openPages)).toEqual([])
  })
})

describe('by keyboard', () => {
  it('the first Tab offers to skip the menu, and Enter goes to the page', async () => {
    const { page } = await openVisit({ baseUrl: desk.api.url, client: desk.people.clerk.client })
    await page.goto('/detections')
    await expectLoaded(page)
    await page.keyboard.press('Tab')
    await expectPage(page.getByRole('link', { name: 'Skip to the page' })).toBeFocused()
    await page.keyboard.press('Enter')
    await expectPage(page.getByRole('main')).toBeFocused()
  })

  it('a long table is paged, and the page stands in the address', async () => {
    const { page } = await openVisit({ baseUrl: desk.api.url, client: desk.people.clerk.client })
    await page.goto('/detections')
    await expectLoaded(page)
    const pages = page.getByRole('navigation', { name: 'Pages of detections' })
    await expectPage(pages).toContainText('1–50 of 60 detections')
    await page.getByRole('button', { name: 'Next page' }).focus()
    await page.keyboard.press('Enter')
    await expectPage(pages).toContainText('51–60 of 60 detections')
    await expectPage(page).toHaveURL(/[?&]page=2/)
    await page.keyboard.press('Shift+Tab')
    await expectPage(page.getByRole('button', { name: 'Previous page' })).toBeFocused()
    await page.keyboard.press('Space')
    await expectPage(pages).toContainText('1–50 of 60 detections')
  })
})
