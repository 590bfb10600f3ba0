import type { Page } from 'playwright'
import { goTo } from './sign-in.ts'

/** Disputes the play of the detection one is on, and comes to the dispute. */
export async function disputePlay(page: Page, reason: string): Promise<void> {
  await page.getByRole('button', { name: 'Dispute this play' }).click()
  await page.getByLabel('What is wrong with this play').fill(reason)
  await page.getByRole('button', { name: 'Open the dispute' }).click()
  await page.getByRole('heading', { name: /^Dispute No\. \d+$/, level: 1 }).waitFor()
}

/** Opens the only dispute of the list. */
export async function openDispute(page: Page): Promise<void> {
  await goTo(page, 'Disputes')
  await page.getByRole('link', { name: /^Dispute \d+$/ }).click()
  await page.getByRole('heading', { name: 'Decide' }).waitFor()
}

export async function upholdDispute(page: Page, reason: string): Promise<void> {
  await page.getByLabel(/^Upheld/).check()
  await page.getByLabel('Reason', { exact: true }).fill(reason)
  await page.getByRole('button', { name: 'Decide' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Uphold and remove the play' }).click()
}
