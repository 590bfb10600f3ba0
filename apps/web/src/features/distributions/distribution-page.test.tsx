import {
  approveDistribution,
  calculateDistribution,
  distributionViewSchema,
  getDistribution,
  issueDistribution,
  type DistributionView,
  type Role,
} from '@fieldfare/contracts'
import { screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { distributionsRoutes } from './routes.tsx'

const digest = '0123456789abcdef'.repeat(4)
const station = {
  id: '40000000-0000-4000-8000-000000000001',
  callName: 'RCST',
  name: 'Radio Costa',
  timeZone: 'Europe/Lisbon',
}
const yes = { allowed: true, reason: null }

function monthWith(changes: Partial<DistributionView>): DistributionView {
  return distributionViewSchema.parse({
    month: '2026-11',
    status: 'calculated',
    currency: 'EUR',
    feeMinor: '600000',
    netMinor: '495000',
    allocatedMinor: '478500',
    heldBackMinor: '16500',
    payees: 1,
    plays: 42,
    calculatedAt: '2026-12-01T09:12:44Z',
    calculatedByName: 'Ines Albar',
    approvedAt: null,
    approvedByName: null,
    issuedAt: null,
    id: '50000000-0000-4000-8000-000000000001',
    run: 2,
    ruleVersion: '2026-01',
    digest,
    failure: null,
    stations: [
      {
        station,
        heldSeconds: 2_500_000,
        expectedSeconds: 2_592_000,
        coveredDays: 30,
        feeMinor: '600000',
        deductions: [
          { code: 'administration', label: 'Administration', ratePpm: 125_000, amountMinor: '75000' },
          { code: 'social', label: 'Social fund', ratePpm: 50_000, amountMinor: '30000' },
        ],
        netMinor: '495000',
        pools: [
          {
            right: 'works',
            poolMinor: '495000',
            plays: 42,
            creditedSeconds: 7_200,
            perHourMinor: '247500',
            allocatedMinor: '478500',
            heldBackMinor: '16500',
          },
        ],
      },
    ],
    holdbacks: [],
    payeeTotals: [],
    cautions: ['14 detections wait for review and are not counted.'],
    steps: { calculate: yes, approve: yes, issue: { allowed: false, reason: 'Not approved.' }, reopen: yes },
    ...changes,
  })
}

let server: FakeServer

function openMonth(view: DistributionView, role: Role = 'clerk') {
  server.answer(getDistribution, view)
  renderRoutes(distributionsRoutes, { at: '/distributions/2026-11', role })
}

beforeEach(() => {
  vi.stubGlobal(
    'EventSource',
    class extends EventTarget {
      close(): void {
        // Nothing is ever sent.
      }
    },
  )
  server = createFakeServer()
})

describe('approving a month', () => {
  it('sends the digest that is on the screen', async () => {
    openMonth(monthWith({}))
    await userEvent.click(await screen.findByRole('button', { name: 'Approve' }))
    const dialog = screen.getByRole('dialog', { name: 'Approve the distribution of November 2026?' })
    server.answer(approveDistribution, monthWith({ status: 'approved', approvedByName: 'Tomás Reis' }))
    await userEvent.click(within(dialog).getByRole('button', { name: 'Approve November 2026' }))
    expect(await screen.findByText('November 2026 is approved.')).toBeInTheDocument()
    expect(server.requestsTo(approveDistribution)[0]?.body).toEqual({ digest })
  })

  it('keeps the dialog open with the reason when a second person is needed', async () => {
    openMonth(monthWith({}))
    const detail = 'You calculated this month yourself; another clerk must approve it.'
    server.handle(approveDistribution, () => problemAnswer('second-person-needed', { detail }))
    await userEvent.click(await screen.findByRole('button', { name: 'Approve' }))
    const dialog = screen.getByRole('dialog')
    await userEvent.click(within(dialog).getByRole('button', { name: 'Approve November 2026' }))
    expect(await within(dialog).findByText(detail)).toBeInTheDocument()
  })

  it('says beforehand why it is closed to the clerk who calculated', async () => {
    const reason = 'You calculated this month yourself; another clerk must approve it.'
    openMonth(monthWith({ steps: { ...monthWith({}).steps, approve: { allowed: false, reason } } }))
    expect(await screen.findByText(reason)).toBeInTheDocument()
    expect(screen.getByRole('button', { name: 'Approve' })).toBeDisabled()
  })
})

describe('the page of a month', () => {
  it('shows every deduction by name and totals that close', async () => {
    openMonth(monthWith({}))
    const fees = await screen.findByRole('table', { name: 'Fees and deductions' })
    expect(within(fees).getByRole('columnheader', { name: /Administration \(12\.5/ })).toBeInTheDocument()
    const total = within(fees).getByRole('row', { name: /All stations/ })
    expect(total).toHaveTextContent('€ 6,000.00')
    expect(total).toHaveTextContent('\u2212€ 750.00')
    expect(total).toHaveTextContent('€ 4,950.00')
  })

  it('lets an auditor read and take no step', async () => {
    openMonth(monthWith({}), 'auditor')
    expect(await screen.findByText(/14 detections wait/)).toBeInTheDocument()
    for (const name of ['Approve', 'Calculate again', 'Return to open']) {
      expect(screen.queryByRole('button', { name })).not.toBeInTheDocument()
    }
  })

  it('shows that a worker is at it once calculating was asked for', async () => {
    openMonth(monthWith({ status: 'open', digest: null }))
    await userEvent.click(
      await screen.findByRole('button', { name: 'Calculate the month' }).then((button) => {
        const working = monthWith({ status: 'calculating', digest: null })
        server.answer(calculateDistribution, working)
        server.answer(getDistribution, working)
        return button
      }),
    )
    expect(await screen.findByRole('progressbar', { name: 'Calculating the month' })).toBeInTheDocument()
  })

  it('asks before it issues, and says that this is for good', async () => {
    openMonth(monthWith({ status: 'approved', steps: { ...monthWith({}).steps, issue: yes } }))
    await userEvent.click(await screen.findByRole('button', { name: 'Issue the statements' }))
    const dialog = screen.getByRole('dialog', { name: 'Issue the statements of November 2026?' })
    expect(dialog).toHaveTextContent('This cannot be undone')
    expect(server.requestsTo(issueDistribution)).toHaveLength(0)
  })
})
