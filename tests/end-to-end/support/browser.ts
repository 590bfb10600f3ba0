import { chromium, type Browser, type BrowserContext, type Page } from 'playwright'
import { atEndOfFile } from '../../support/index.ts'
import type { TestClient } from '../../support/test-client.ts'

/** Debian's own Chromium, as found where the product is tested; nothing is downloaded. */
const EXECUTABLE = process.env['FIELDFARE_TEST_CHROMIUM'] ?? '/usr/bin/chromium'
const ARGUMENTS = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

/** Far from every station and from UTC, so that a time shown in the browser's own zone is found out. */
const BROWSER_TIME_ZONE = 'Asia/Tokyo'
/** A page that changes under load of two cores still changes within this. */
const PATIENCE_MS = 20_000

/** What went wrong in a page, with the HTTP status where a refused request is the reason. */
type Mishap = { status: number | null; text: string }

/** One person's browser: a window, and what went wrong in it. */
export type Visit = {
  page: Page
  /** From now on a refusal with this status is what the test is about. */
  provoke: (status: number) => void
  /** Console errors, exceptions and failed requests, but for the provoked ones. */
  mishaps: () => string[]
}

export type VisitOptions = {
  baseUrl: string
  /** Already signed in; without it the person comes to the sign-in page. */
  client?: TestClient
  colourScheme?: 'light' | 'dark'
  width?: number
}

let browser: Promise<Browser> | undefined

function launch(): Promise<Browser> {
  browser ??= chromium.launch({ executablePath: EXECUTABLE, args: ARGUMENTS }).then((launched) => {
    atEndOfFile(() => launched.close())
    return launched
  })
  return browser
}

function watch(page: Page): Mishap[] {
  const mishaps: Mishap[] = []
  page.on('console', (message) => {
    if (message.type() !== 'error') return
    const refusal = /status of (\d{3})/.exec(message.text())
    const where = message.location().url
    mishaps.push({
      status: refusal === null ? null : Number(refusal[1]),
      text: `console: ${message.text()} ${where}`,
    })
  })
  page.on('pageerror', (error) => mishaps.push({ status: null, text: `exception: ${error.message}` }))
  page.on('requestfailed', (request) => {
    const reason = request.failure()?.errorText ?? ''
    // The page itself lets go of requests whose answer nobody waits for any more: going elsewhere ends them and the
    // stream of events, and a download leaves its navigation.
    if (reason === 'net::ERR_ABORTED') return
    mishaps.push({ status: null, text: `failed: ${request.method()} ${request.url()} ${reason}` })
  })
  page.on('response', (response) => {
    if (response.status() < 400) return
    const request = response.request()
    mishaps.push({
      status: response.status(),
      text: `${response.status()}: ${request.method()} ${request.url()}`,
    })
  })
  return mishaps
}

async function signInBeforehand(context: BrowserContext, baseUrl: string, client: TestClient): Promise<void> {
  await context.addCookies(
    [...client.cookies].map(([name, value]) => ({ name, value: encodeURIComponent(value), url: baseUrl })),
  )
}

/** A person opens a browser of their own. */
export async function openVisit(options: VisitOptions): Promise<Visit> {
  const { baseUrl, client, colourScheme = 'light', width = 1280 } = options
  const context = await (
    await launch()
  ).newContext({
    baseURL: baseUrl,
    timezoneId: BROWSER_TIME_ZONE,
    locale: 'en-GB',
    colorScheme: colourScheme,
    viewport: { width, height: 900 },
    acceptDownloads: true,
  })
  context.setDefaultTimeout(PATIENCE_MS)
  if (client !== undefined) await signInBeforehand(context, baseUrl, client)
  const page = await context.newPage()
  const mishaps = watch(page)
  const provoked = new Set<number>()
  return {
    page,
    provoke: (status) => void provoked.add(status),
    mishaps: () =>
      mishaps.filter(({ status }) => status === null || !provoked.has(status)).map(({ text }) => text),
  }
}
