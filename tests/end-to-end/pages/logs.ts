import type { Locator, Page } from 'playwright'
import { goTo } from './sign-in.ts'

export type LogToSend = { path: string; startedAtLocal: string }

/** Opens the page on which logs are sent. */
export async function openLogUpload(page: Page): Promise<void> {
  await goTo(page, 'Station logs')
  await page.getByRole('link', { name: 'Send station logs' }).first().click()
  await page.getByRole('heading', { name: 'Send station logs', level: 1 }).waitFor()
}

/** Chooses a recording, says when it begins, and sends it. */
export async function sendLog(page: Page, { path, startedAtLocal }: LogToSend): Promise<void> {
  await page.getByLabel('Recordings', { exact: true }).setInputFiles(path)
  await page.getByLabel('Recording begins').fill(startedAtLocal)
  await page.getByRole('button', { name: 'Send 1 file' }).click()
}

/** The row of the only file that was chosen. */
export function chosenFile(page: Page): Locator {
  return page.getByRole('list', { name: 'Files to send' }).getByRole('listitem').first()
}

/** From a log that has arrived to the page that shows its analysis. */
export async function followAnalysis(page: Page): Promise<void> {
  await page.getByRole('link', { name: 'Follow its analysis' }).click()
  await page.getByRole('heading', { name: 'The recording' }).waitFor()
}

export type ListedDetection = { title: string; startedAt: string; clock: string }

/** The detections of the table on this page, in its order. */
export async function listedDetections(page: Page): Promise<ListedDetection[]> {
  const rows = page
    .getByRole('table')
    .getByRole('row')
    .filter({ has: page.locator('time') })
  await rows.first().waitFor()
  return Promise.all(
    (await rows.all()).map(async (row) => {
      const time = row.locator('time').first()
      return {
        title: (await row.innerText()).replaceAll(/\s+/g, ' '),
        startedAt: (await time.getAttribute('datetime')) ?? '',
        clock: /\d{2}:\d{2}:\d{2}/.exec(await time.innerText())?.[0] ?? '',
      }
    }),
  )
}
