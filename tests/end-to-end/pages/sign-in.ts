import type { Page } from 'playwright'
import { TEST_PASSWORD, type TestUser } from '../../support/test-api.ts'

/** Fills in the form of the page one is on. */
export async function fillInSignIn(page: Page, email: string, password: string): Promise<void> {
  await page.getByLabel('E-mail address').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
}

/** Signs in from the start page and waits for the page with which this person's day begins. */
export async function signIn(page: Page, user: Pick<TestUser, 'email'>): Promise<void> {
  await page.goto('/')
  await fillInSignIn(page, user.email, TEST_PASSWORD)
  await page.getByRole('navigation', { name: 'Main' }).waitFor()
}

export async function signOut(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Sign out' }).click()
  await page.getByRole('heading', { name: 'Sign in', level: 1 }).waitFor()
}

/** Follows the menu. */
export async function goTo(page: Page, entry: string): Promise<void> {
  await page.getByRole('navigation', { name: 'Main' }).getByRole('link', { name: entry, exact: true }).click()
}
