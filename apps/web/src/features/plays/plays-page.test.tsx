import { listMonths, listPlays, listStations, openDispute } from '@fieldfare/contracts'
import { screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { idOf, pageOfRows, playView, stationView } from '../../testing/airtime-fixtures.ts'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { playsRoutes } from './routes.tsx'

let server: FakeServer

beforeEach(() => {
  server = createFakeServer()
  server.answer(listStations, { items: [stationView()] })
  server.answer(listMonths, { current: '2026-11', items: [{ month: '2026-11', status: 'open' }] })
})

describe('plays', () => {
  it('lets a publisher dispute a play beside the list, without evidence or a list of stations', async () => {
    server.answer(listPlays, pageOfRows([playView({ canDispute: true })]))
    server.handle(openDispute, () =>
      problemAnswer('conflict', { detail: 'This play is in dispute already.' }),
    )
    const { router } = renderRoutes(playsRoutes, { at: '/plays?month=2026-11', role: 'publisher' })

    await userEvent.click(await screen.findByRole('link', { name: /^Dispute Hedgerow Morning/ }))
    const reason = await screen.findByLabelText('What is wrong with this play')
    expect(reason).toHaveFocus()
    expect(router.state.location.search).toContain('month=2026-11')
    await userEvent.click(screen.getByRole('button', { name: 'Open the dispute' }))
    expect(await screen.findByText('Reason is needed.')).toBeVisible()
    await userEvent.type(reason, 'We hear another song.')
    await userEvent.click(screen.getByRole('button', { name: 'Open the dispute' }))

    expect(await screen.findByRole('alert')).toHaveTextContent('This play is in dispute already.')
    expect(server.requestsTo(openDispute)[0]?.body).toEqual({
      playId: idOf(30),
      reason: 'We hear another song.',
    })
    expect(screen.queryByRole('combobox', { name: 'Station' })).toBeNull()
    expect(server.requestsTo(listStations)).toHaveLength(0)
    expect(screen.queryByRole('link', { name: /06:12:30/ })).toBeNull()

    await userEvent.click(screen.getByRole('button', { name: 'Leave it' }))
    await waitFor(() => expect(router.state.location.search).toBe('?month=2026-11'))
  })

  it('leads a clerk to the evidence and offers no dispute', async () => {
    server.answer(listPlays, pageOfRows([playView()]))
    renderRoutes(playsRoutes, { at: '/plays', role: 'clerk' })

    expect(await screen.findByRole('link', { name: /06:12:30/ })).toHaveAttribute(
      'href',
      `/detections/${idOf(20)}`,
    )
    expect(screen.queryByRole('link', { name: /^Dispute/ })).toBeNull()
  })
})
