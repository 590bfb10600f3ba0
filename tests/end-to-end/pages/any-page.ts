import { AxeBuilder } from '@axe-core/playwright'
import { expect as expectPage } from 'playwright/test'
import type { Page } from 'playwright'
import { z } from 'zod'
import { waitUntil } from '../../support/index.ts'

/** Waits until a page has its heading and waits for nothing any more. */
export async function expectLoaded(page: Page): Promise<void> {
  await expectPage(page.getByRole('heading', { level: 1 })).toBeVisible()
  await expectPage(page.getByRole('status').filter({ hasText: '…' })).toHaveCount(0)
  await expectPage(page.locator('[aria-busy=true]')).toHaveCount(0)
}

/** Colours that are still changing would be measured half way. */
async function waitForTransitions(page: Page): Promise<void> {
  await waitUntil(async () => (await page.evaluate('document.getAnimations().length')) === 0, {
    everyMs: 30,
    timeoutMs: 5000,
    description: 'the end of all transitions',
  })
}

/**
 * What axe finds serious or critical on the page, one line a rule with the first places. In the dark nothing but the
 * colours is another, so nothing else is looked at again.
 */
export async function seriousFindings(page: Page, scheme: 'light' | 'dark'): Promise<string[]> {
  await page.emulateMedia({ colorScheme: scheme })
  await waitForTransitions(page)
  const axe = new AxeBuilder({ page })
  const { violations } = await (scheme === 'dark' ? axe.withRules(['color-contrast']) : axe).analyze()
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, help, nodes }) => {
      const places = nodes.slice(0, 3).map(({ target }) => target.join(' '))
      return `${scheme}: ${id} (${help}): ${places.join(' | ')}`
    })
}

const SIDEWAYS = 'document.documentElement.scrollWidth - document.documentElement.clientWidth'

/** How many pixels a page is wider than its window, once its charts have taken their new size; 0 is as it should be. */
export async function sidewaysPixels(page: Page): Promise<number> {
  const measure = async () => z.number().parse(await page.evaluate(SIDEWAYS))
  // Whether it settled is for the measure below to say.
  await waitUntil(async () => (await measure()) === 0, { everyMs: 50, timeoutMs: 5000 }).catch(
    () => undefined,
  )
  return measure()
}
