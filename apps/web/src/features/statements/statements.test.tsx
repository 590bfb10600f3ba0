import {
  getStatement,
  listMonths,
  listStatementLinePlays,
  listStatements,
  openDispute,
  playViewSchema,
  statementSummarySchema,
  statementViewSchema,
  type Role,
} from '@fieldfare/contracts'
import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { statementsRoutes } from './routes.tsx'

const issued = statementSummarySchema.parse({
  id: '80000000-0000-4000-8000-000000000001',
  number: '2026-11-0001',
  month: '2026-11',
  party: { id: '10000000-0000-4000-8000-000000000001', name: 'Quim Publishing', ipi: null },
  currency: 'EUR',
  currencyDigits: 2,
  netMinor: '388000',
  status: 'issued',
  issuedAt: '2026-12-01T11:00:00Z',
  hasPdf: true,
})
const draft = statementSummarySchema.parse({
  ...issued,
  id: '80000000-0000-4000-8000-000000000002',
  number: '2026-11-0002',
  status: 'draft',
  issuedAt: null,
  hasPdf: false,
})
const statement = statementViewSchema.parse({
  ...issued,
  periodFrom: '2026-11-01',
  periodTo: '2026-11-30',
  ruleVersion: '2026-01',
  grossMinor: '470303',
  deductions: [],
  rights: [],
  stations: [],
  holdbacks: [],
  lines: 1,
})
const play = playViewSchema.parse({
  id: '62000000-0000-4000-8000-000000000001',
  detectionId: null,
  station: {
    id: '40000000-0000-4000-8000-000000000001',
    callName: 'RCST',
    name: 'Radio Costa',
    timeZone: 'Europe/Lisbon',
  },
  recording: {
    id: '20000000-0000-4000-8000-000000000001',
    isrc: 'PTA6Q2000047',
    title: 'First light',
    artist: 'Marta Quim',
  },
  work: null,
  startedAt: '2026-11-12T08:14:01Z',
  endedAt: '2026-11-12T08:17:02Z',
  durationSeconds: 181,
  localDay: '2026-11-12',
  status: 'counted',
  isInDispute: false,
  canDispute: true,
})

let server: FakeServer

function openLine(role: Role) {
  renderRoutes(statementsRoutes, { at: `/statements/${issued.id}/lines/1`, role })
}

beforeEach(() => {
  server = createFakeServer()
  server.answer(listMonths, { current: '2026-11', items: [] })
  server.answer(listStatements, { items: [issued, draft], total: 2, page: 1, pageSize: 50 })
  server.answer(getStatement, statement)
  server.answer(listStatementLinePlays, { items: [play], total: 1, page: 1, pageSize: 50 })
})

describe('the list of statements', () => {
  it('offers the files of what is issued and none of a draft', async () => {
    renderRoutes(statementsRoutes, { at: '/statements' })
    expect(await screen.findByRole('link', { name: '2026-11-0001' })).toBeInTheDocument()
    const files = screen.getAllByRole('link', { name: /^(PDF|CSV)$/ })
    expect(files.map((file) => file.getAttribute('href'))).toEqual([
      `/api/statements/${issued.id}/statement.pdf`,
      `/api/statements/${issued.id}/statement.csv`,
    ])
  })
})

describe('the plays behind a line', () => {
  it('can be disputed by a publisher, with a reason, and a refusal stands in words', async () => {
    openLine('publisher')
    await userEvent.click(await screen.findByRole('button', { name: 'Dispute' }))
    const detail = 'This play is in dispute already.'
    server.handle(openDispute, () => problemAnswer('conflict', { detail }))
    await userEvent.type(screen.getByRole('textbox'), 'Another version was played.')
    await userEvent.click(screen.getByRole('button', { name: 'Open the dispute' }))
    expect(await screen.findByText(detail)).toBeInTheDocument()
    expect(server.requestsTo(openDispute)[0]?.body).toEqual({
      playId: play.id,
      reason: 'Another version was played.',
    })
  })

  it('offer no dispute where the answer does not allow it', async () => {
    server.answer(listStatementLinePlays, {
      items: [{ ...play, canDispute: false, isInDispute: true }],
      total: 1,
      page: 1,
      pageSize: 50,
    })
    openLine('clerk')
    expect(await screen.findByText('In dispute')).toBeInTheDocument()
    expect(screen.queryByRole('button', { name: 'Dispute' })).not.toBeInTheDocument()
  })
})
