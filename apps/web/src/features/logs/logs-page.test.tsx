import { listLogs, listMonths, listStations, serverEventSchema } from '@fieldfare/contracts'
import { act, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { idOf, logView, pageOfRows, stationRef, stationView } from '../../testing/airtime-fixtures.ts'
import { createFakeServer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { logsRoutes } from './routes.tsx'

class FakeEventSource extends EventTarget {
  static last: FakeEventSource | null = null
  readyState = 1
  constructor() {
    super()
    FakeEventSource.last = this
  }
  close(): void {
    this.readyState = 2
  }
}

function tell(event: unknown): void {
  const { kind } = serverEventSchema.parse(event)
  act(() => {
    FakeEventSource.last?.dispatchEvent(new MessageEvent(kind, { data: JSON.stringify(event) }))
  })
}

let server: FakeServer

beforeEach(() => {
  vi.stubGlobal('EventSource', FakeEventSource)
  server = createFakeServer()
  server.answer(listStations, { items: [stationView()] })
  server.answer(listMonths, { current: '2026-11', items: [{ month: '2026-11', status: 'open' }] })
})

const underWay = { status: 'analysing', analysedAt: null, musicSeconds: null, identifiedSeconds: null }

describe('station logs', () => {
  it('asks the server for what the address says', async () => {
    server.answer(listLogs, pageOfRows([logView()]))
    renderRoutes(logsRoutes, { at: `/logs?status=failed&month=2026-11&sort=station&page=2` })

    expect(await screen.findByRole('table')).toBeVisible()

    const asked = server.requestsTo(listLogs)[0]?.url.searchParams
    expect(Object.fromEntries(asked ?? [])).toEqual({
      status: 'failed',
      month: '2026-11',
      sort: 'station',
      page: '2',
      pageSize: '50',
    })
    expect(screen.getByRole('combobox', { name: 'State' })).toHaveValue('failed')
  })

  it('puts a chosen filter into the address and starts at page one', async () => {
    server.answer(listLogs, pageOfRows([logView()]))
    const { router } = renderRoutes(logsRoutes, { at: '/logs?page=2' })
    await screen.findByRole('table')

    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Station' }), stationRef.name)

    await waitFor(() => expect(router.state.location.search).toBe(`?stationId=${stationRef.id}`))
  })

  it('moves the bar of a row as a worker tells how far it is', async () => {
    server.answer(
      listLogs,
      pageOfRows([
        logView({
          ...underWay,
          progress: { stage: 'matching', doneSeconds: 360, totalSeconds: 3600, secondsLeft: 50 },
        }),
        logView({ id: idOf(11), startedAt: '2026-11-03T09:00:00Z' }),
      ]),
    )
    renderRoutes(logsRoutes, { at: '/logs' })
    const bar = await screen.findByRole('progressbar', { name: 'Listening for recordings' })
    expect(bar).toHaveAttribute('aria-valuenow', '10')

    tell({
      kind: 'log-progress',
      logId: idOf(10),
      stationId: stationRef.id,
      status: 'analysing',
      progress: { stage: 'matching', doneSeconds: 2700, totalSeconds: 3600, secondsLeft: 12 },
    })

    await waitFor(() =>
      expect(screen.getByRole('progressbar', { name: 'Listening for recordings' })).toHaveAttribute(
        'aria-valuenow',
        '75',
      ),
    )
    expect(screen.getByText('about 15 seconds left')).toBeVisible()
    expect(server.requestsTo(listLogs)).toHaveLength(1)
  })

  it('fetches the list anew once an analysis has ended', async () => {
    server.answer(listLogs, pageOfRows([logView({ ...underWay, status: 'queued' })]))
    renderRoutes(logsRoutes, { at: '/logs' })
    const table = within(await screen.findByRole('table'))
    expect(table.getByText('Waiting')).toBeVisible()

    server.answer(
      listLogs,
      pageOfRows([
        logView({
          status: 'rejected',
          failure: {
            code: 'silent',
            message: 'The recording is silent throughout. Check the recorder’s input.',
          },
        }),
      ]),
    )
    tell({
      kind: 'log-progress',
      logId: idOf(10),
      stationId: stationRef.id,
      status: 'rejected',
      progress: null,
    })

    expect(await table.findByText('Refused')).toBeVisible()
    expect(table.getByText('The recording is silent throughout. Check the recorder’s input.')).toBeVisible()
  })

  it('offers sending to those who may send, and not to an auditor', async () => {
    server.answer(listLogs, pageOfRows([]))
    const { unmount } = renderRoutes(logsRoutes, { at: '/logs', role: 'uploader' })
    expect((await screen.findAllByRole('link', { name: 'Send station logs' })).length).toBeGreaterThan(0)
    unmount()

    renderRoutes(logsRoutes, { at: '/logs', role: 'auditor' })
    expect(await screen.findByText('No station logs yet')).toBeVisible()
    expect(screen.queryByRole('link', { name: 'Send station logs' })).toBeNull()
  })
})
