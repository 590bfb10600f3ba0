import { getMonthOverview, listMonths } from '@fieldfare/contracts'
import { screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { idOf, monthOverview, stationRef } from '../../testing/airtime-fixtures.ts'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { overviewRoutes } from './routes.tsx'

const nothing = { heldSeconds: 0, musicSeconds: 0, identifiedSeconds: 0, plays: 0 }
const emptyTotals = {
  ...nothing,
  expectedSeconds: 0,
  waitingForReview: 0,
  openDisputes: 0,
  logsInWork: 0,
  logsRefused: 0,
}

let server: FakeServer

beforeEach(() => {
  server = createFakeServer()
  server.answer(listMonths, { current: '2026-11', items: [{ month: '2026-11', status: 'open' }] })
  server.answer(getMonthOverview, monthOverview())
})

const askedMonths = () => server.requestsTo(getMonthOverview).map(({ url }) => url.pathname.split('/').at(-2))

describe('the month at a glance', () => {
  it('begins with the month the desk works on and leads from each figure to its list', async () => {
    renderRoutes(overviewRoutes, { at: '/' })

    expect(await screen.findByRole('heading', { level: 1, name: 'November 2026' })).toBeVisible()
    expect(askedMonths()).toEqual(['2026-11'])
    const figure = async (label: string) => {
      const term = await screen.findByText(label, { selector: 'dt' })
      return within(term.parentElement ?? term)
    }
    const waiting = await figure('Waiting for review')
    expect(waiting.getByRole('link', { name: '7' })).toHaveAttribute(
      'href',
      '/detections?month=2026-11&state=waiting',
    )
    expect((await figure('Airtime held')).getByText(/50/)).toHaveTextContent('50')
    expect((await figure('Music identified')).getByRole('link')).toHaveTextContent('87.5')
    expect((await figure('Logs in work')).getByRole('link', { name: /3 refused or failed/ })).toHaveAttribute(
      'href',
      '/logs?month=2026-11&status=rejected',
    )
  })

  it('counts plays by station, each count leading to the plays', async () => {
    renderRoutes(overviewRoutes, { at: '/?month=2026-11', role: 'auditor' })

    const table = await screen.findByRole('table', { name: 'Plays and airtime by station' })
    expect(within(table).getByRole('link', { name: stationRef.name })).toHaveAttribute(
      'href',
      `/stations/${stationRef.id}?month=2026-11`,
    )
    expect(within(table).getByRole('link', { name: '118' })).toHaveAttribute(
      'href',
      `/plays?stationId=${idOf(1)}&month=2026-11`,
    )
  })

  it('has the table behind every chart, its parts adding up to what is held', async () => {
    renderRoutes(overviewRoutes, { at: '/' })

    const days = await screen.findByRole('table', { name: 'Airtime is held on 1 of 2 days' })
    const cells = within(within(days).getAllByRole('row')[2] ?? days).getAllByRole('cell')
    expect(cells.map((cell) => cell.textContent.replace(/\s/g, ' '))).toEqual([
      'Mon, 2 Nov 2026',
      '7 h 0 min',
      '1 h 0 min',
      '4 h 0 min',
      '118',
    ])
    expect(
      screen.getByRole('table', { name: 'Most identified music was heard from 06:00 to 07:00' }),
    ).toBeInTheDocument()
  })

  it('steps to another month in the address and says what to do where nothing is held', async () => {
    const { router } = renderRoutes(overviewRoutes, { at: '/' })
    await screen.findByRole('heading', { level: 1, name: 'November 2026' })
    server.answer(getMonthOverview, monthOverview({ month: '2026-10', totals: emptyTotals }))

    await userEvent.click(screen.getByRole('button', { name: 'Previous month' }))

    expect(await screen.findByText('Nothing is held of October 2026')).toBeVisible()
    expect(router.state.location.search).toBe('?month=2026-10')
    expect(askedMonths()).toContain('2026-10')
    expect(screen.getByRole('link', { name: 'Send station logs' })).toHaveAttribute('href', '/logs/new')
    expect(screen.getByRole('link', { name: 'Go to November 2026' })).toHaveAttribute(
      'href',
      '/?month=2026-11',
    )
  })

  it('falls back to the desk’s month where the address names none', async () => {
    renderRoutes(overviewRoutes, { at: '/?month=2026-13' })
    await waitFor(() => expect(askedMonths()).toEqual(['2026-11']))
  })

  it('offers another try when the sums cannot be fetched', async () => {
    server.handle(getMonthOverview, () => problemAnswer('internal-error', { detail: 'It broke.' }))
    renderRoutes(overviewRoutes, { at: '/' })
    expect(await screen.findByRole('alert')).toHaveTextContent('It broke.')
    server.answer(getMonthOverview, monthOverview())

    await userEvent.click(screen.getByRole('button', { name: 'Try again' }))

    expect(await screen.findByText('Waiting for review')).toBeVisible()
  })
})
