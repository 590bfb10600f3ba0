import { listDetections, listMonths, listStations } from '@fieldfare/contracts'
import { screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { detectionView, idOf, pageOfRows, stationView } from '../../testing/airtime-fixtures.ts'
import { createFakeServer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { detectionsRoutes } from './routes.tsx'

let server: FakeServer

beforeEach(() => {
  server = createFakeServer()
  server.answer(listStations, { items: [stationView()] })
  server.answer(listMonths, { current: '2026-11', items: [{ month: '2026-11', status: 'open' }] })
  server.answer(listDetections, { ...pageOfRows([detectionView()]), total: 120 })
})

describe('the list of detections', () => {
  it('asks for exactly what the address says and exports the same', async () => {
    renderRoutes(detectionsRoutes, {
      at: `/detections?state=waiting&recordingId=${idOf(2)}&day=2026-11-03&sort=-confidence&page=2`,
    })
    await screen.findByRole('table')

    const asked = server.requestsTo(listDetections)[0]?.url.searchParams
    const criteria = {
      state: 'waiting',
      recordingId: idOf(2),
      day: '2026-11-03',
      sort: '-confidence',
    }
    expect(Object.fromEntries(asked ?? [])).toEqual({ ...criteria, page: '2', pageSize: '50' })
    const csv = new URL(screen.getByRole<HTMLAnchorElement>('link', { name: 'CSV' }).href)
    expect(csv.pathname).toBe('/api/detections.csv')
    expect(Object.fromEntries(csv.searchParams)).toEqual(criteria)
  })

  it('sorts by the server and remembers it in the address', async () => {
    const { router } = renderRoutes(detectionsRoutes, { at: '/detections' })
    await screen.findByRole('table')

    await userEvent.click(screen.getByRole('button', { name: /Length/ }))

    await waitFor(() => expect(router.state.location.search).toMatch(/sort=-?durationSeconds/))
    await waitFor(() =>
      expect(server.requestsTo(listDetections).at(-1)?.url.searchParams.get('sort')).toMatch(
        /^-?durationSeconds$/,
      ),
    )
  })

  it('carries the list on into each detection', async () => {
    renderRoutes(detectionsRoutes, { at: '/detections?state=waiting' })
    await screen.findByRole('table')

    expect(screen.getByRole('link', { name: /3 Nov 2026, 06:12:30/ })).toHaveAttribute(
      'href',
      `/detections/${idOf(20)}?state=waiting`,
    )
  })
})
