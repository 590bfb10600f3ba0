import {
  createLicence,
  createStation,
  getStation,
  getStationDay,
  getStationMonth,
  listLogs,
  listMonths,
} from '@fieldfare/contracts'
import { screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { idOf, logView, pageOfRows, stationRef, stationView } from '../../testing/airtime-fixtures.ts'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { licenceOn } from './licences.ts'
import { stationsRoutes } from './routes.tsx'

const blank = { label: null, logId: null, detectionId: null, playId: null }

let server: FakeServer

beforeEach(() => {
  server = createFakeServer()
  server.answer(listMonths, { current: '2026-11', items: [{ month: '2026-11', status: 'open' }] })
  server.answer(listLogs, pageOfRows([logView()]))
  server.answer(getStation, stationView())
  server.answer(getStationMonth, {
    month: '2026-11',
    timeZone: stationRef.timeZone,
    days: [
      {
        day: '2026-11-03',
        from: '2026-11-03T00:00:00Z',
        to: '2026-11-04T00:00:00Z',
        heldSeconds: 7200,
        identifiedSeconds: 3600,
        plays: 12,
        spans: [],
      },
    ],
  })
})

const stationAddress = `/stations/${stationRef.id}`

describe('a station', () => {
  it('shows the month of the address, a link a day', async () => {
    renderRoutes(stationsRoutes, { at: `${stationAddress}?month=2026-11`, role: 'uploader' })

    expect(await screen.findByRole('link', { name: /3 Nov 2026/ })).toHaveAttribute(
      'href',
      `${stationAddress}/days/2026-11-03`,
    )
    expect(screen.getByText('on 1 of 1 days')).toBeVisible()
    expect(screen.getByText('In force today')).toBeVisible()
  })

  it('shows an uploader how to send logs and none of the administration', async () => {
    renderRoutes(stationsRoutes, { at: stationAddress, role: 'uploader' })

    expect(await screen.findByRole('link', { name: 'Send station logs' })).toHaveAttribute(
      'href',
      `/logs/new?stationId=${stationRef.id}`,
    )
    expect(screen.queryByRole('link', { name: /Edit|Add a licence/ })).toBeNull()
  })

  it('lists the plays and gaps of a day with their evidence', async () => {
    server.answer(getStationDay, {
      day: '2026-11-03',
      timeZone: stationRef.timeZone,
      from: '2026-11-03T00:00:00Z',
      to: '2026-11-04T00:00:00Z',
      heldSeconds: 43_200,
      musicSeconds: 200,
      identifiedSeconds: 200,
      spans: [
        { ...blank, kind: 'held', from: '2026-11-03T00:00:00Z', to: '2026-11-03T12:00:00Z' },
        {
          ...blank,
          kind: 'play',
          from: '2026-11-03T06:00:00Z',
          to: '2026-11-03T06:03:20Z',
          label: 'Hedgerow Morning',
          detectionId: idOf(20),
        },
      ],
    })
    renderRoutes(stationsRoutes, { at: `${stationAddress}/days/2026-11-03`, role: 'clerk' })

    const table = await screen.findByRole('table', { name: /^Plays and gaps/ })
    const rows = within(table).getAllByRole('row').slice(1)
    expect(rows.map((row) => row.textContent.replace(/\s/g, ' '))).toEqual([
      '06:00:00 WET06:03:20 WET3:20PlayHedgerow Morning',
      '12:00:00 WET00:00:00 WET12 h 0 minNothing heldNothing named',
    ])
    expect(within(table).getByRole('link', { name: /06:00:00/ })).toHaveAttribute(
      'href',
      `/detections/${idOf(20)}`,
    )
    expect(screen.getByRole('link', { name: 'Day before' })).toHaveAttribute(
      'href',
      `${stationAddress}/days/2026-11-02`,
    )
  })
})

describe('a licence', () => {
  const fill = async (fee: string, part: string) => {
    await userEvent.type(await screen.findByLabelText('First day'), '2027-01-01')
    await userEvent.type(screen.getByLabelText('Fee a month in EUR'), fee)
    await userEvent.clear(screen.getByLabelText('Part that goes to works, in %'))
    await userEvent.type(screen.getByLabelText('Part that goes to works, in %'), part)
    await userEvent.click(screen.getByRole('button', { name: 'Save the licence' }))
  }

  it('sends the fee in minor units and the part exactly', async () => {
    server.answer(createLicence, stationView({ canEdit: true }))
    const { router } = renderRoutes(stationsRoutes, { at: `${stationAddress}/licences/new`, role: 'admin' })

    await fill('1,250.5', '62.5')

    await waitFor(() => expect(router.state.location.pathname).toBe(stationAddress))
    expect(server.requestsTo(createLicence)[0]?.body).toEqual({
      validFrom: '2027-01-01',
      validTo: null,
      monthlyFeeMinor: '125050',
      worksPartPpm: 625_000,
    })
  })

  it('explains at the field what is no amount and what is no percentage', async () => {
    renderRoutes(stationsRoutes, { at: `${stationAddress}/licences/new`, role: 'admin' })

    await fill('12.345', '120')

    expect(await screen.findByText('Enter an amount such as 1,250.00.')).toBeVisible()
    expect(screen.getByLabelText('Part that goes to works, in %')).toBeInvalid()
    expect(server.requestsTo(createLicence)).toHaveLength(0)
  })

  it('shows that it overlaps another, at the day the server names', async () => {
    server.handle(createLicence, () =>
      problemAnswer('validation-failed', {
        fieldErrors: [{ path: 'validFrom', message: 'Another licence covers this day.' }],
      }),
    )
    renderRoutes(stationsRoutes, { at: `${stationAddress}/licences/new`, role: 'admin' })

    await fill('1250', '50')

    await waitFor(() =>
      expect(screen.getByLabelText('First day')).toHaveAccessibleDescription(
        'Another licence covers this day.',
      ),
    )
  })

  it('is in force from its first to its last day, both included', () => {
    const [licence] = stationView().licences
    if (licence === undefined) throw new Error('The fixture has a licence.')
    expect(licenceOn([licence], '2025-12-31')).toBeNull()
    expect(licenceOn([licence], '2026-01-01')).toBe(licence)
    expect(licenceOn([licence], '2030-06-01')).toBe(licence)
  })
})

describe('adding a station', () => {
  it('sends what was typed and goes to its page', async () => {
    server.answer(createStation, stationView({ canEdit: true }))
    const { router } = renderRoutes(stationsRoutes, { at: '/stations/new', role: 'admin' })

    await userEvent.type(await screen.findByLabelText('Name'), 'Siskin Coast')
    await userEvent.type(screen.getByLabelText('Call name'), 'siskin')
    await userEvent.click(screen.getByRole('button', { name: 'Add the station' }))

    await waitFor(() => expect(router.state.location.pathname).toBe(stationAddress))
    expect(server.requestsTo(createStation)[0]?.body).toEqual({
      callName: 'SISKIN',
      name: 'Siskin Coast',
      timeZone: 'Europe/Lisbon',
      contactEmail: '',
    })
  })
})
