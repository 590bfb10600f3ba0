import type { Page } from 'playwright'
import { monthInWords } from '../support/months.ts'
import { goTo } from './sign-in.ts'

/** Opens the distribution of a month from the list of months. */
export async function openDistribution(page: Page, month: string): Promise<void> {
  await goTo(page, 'Distributions')
  await page.getByRole('link', { name: monthInWords(month), exact: true }).click()
  await page.getByRole('heading', { name: `Distribution of ${monthInWords(month)}`, level: 1 }).waitFor()
}

/** Waits, without loading anything anew, until the page says the month has come this far. */
export async function expectState(page: Page, state: string): Promise<void> {
  await page
    .locator('header')
    .filter({ has: page.getByRole('heading', { level: 1 }) })
    .getByText(state, { exact: true })
    .waitFor()
}

export async function calculateMonth(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Calculate the month' }).click()
}

export async function approveMonth(page: Page, month: string): Promise<void> {
  await page.getByRole('button', { name: 'Approve', exact: true }).click()
  await page
    .getByRole('dialog')
    .getByRole('button', { name: `Approve ${monthInWords(month)}` })
    .click()
}

export async function issueMonth(page: Page, month: string): Promise<void> {
  await page.getByRole('button', { name: 'Issue the statements' }).click()
  await page
    .getByRole('dialog')
    .getByRole('button', { name: `Issue ${monthInWords(month)}` })
    .click()
}
