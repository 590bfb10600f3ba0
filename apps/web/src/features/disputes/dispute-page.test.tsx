import {
  decideDispute,
  disputeViewSchema,
  getDispute,
  replyToDispute,
  type DisputeView,
  type Role,
} from '@fieldfare/contracts'
import { screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { disputesRoutes } from './routes.tsx'

function disputeWith(changes: Partial<DisputeView>): DisputeView {
  return disputeViewSchema.parse({
    id: '60000000-0000-4000-8000-000000000001',
    number: 17,
    status: 'open',
    detectionId: '61000000-0000-4000-8000-000000000001',
    play: { id: '62000000-0000-4000-8000-000000000001', status: 'counted' },
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
    startedAt: '2026-11-12T08:14:01Z',
    endedAt: '2026-11-12T08:17:02Z',
    month: '2026-11',
    reason: 'The strings come in a bar later.',
    openedAt: '2026-11-29T10:00:00Z',
    openedByName: 'Olga Prado',
    openedByRole: 'auditor',
    decidedAt: null,
    decidedByName: null,
    decisionReason: null,
    messages: [],
    isMonthOpen: true,
    canReply: true,
    canDecide: true,
    ...changes,
  })
}

let server: FakeServer

function openDisputePage(dispute: DisputeView, role: Role = 'clerk') {
  server.answer(getDispute, dispute)
  renderRoutes(disputesRoutes, { at: `/disputes/${dispute.id}`, role })
}

async function askToUphold() {
  await userEvent.click(await screen.findByRole('radio', { name: /^Upheld/ }))
  await userEvent.type(screen.getByRole('textbox', { name: 'Reason' }), 'Another version was played.')
  await userEvent.click(screen.getByRole('button', { name: 'Decide' }))
  return screen.findByRole('dialog', { name: 'Uphold dispute 17?' })
}

beforeEach(() => {
  server = createFakeServer()
})

describe('deciding a dispute', () => {
  it('says the consequence, then sends outcome and reason', async () => {
    openDisputePage(disputeWith({}))
    const dialog = await askToUphold()
    expect(dialog).toHaveTextContent('no longer counts in November 2026')
    expect(server.requestsTo(decideDispute)).toHaveLength(0)
    const decided = disputeWith({
      status: 'upheld',
      canDecide: false,
      canReply: false,
      decidedAt: disputeWith({}).openedAt,
      decidedByName: 'Person Under Test',
      decisionReason: 'Another version was played.',
    })
    server.answer(decideDispute, decided)
    server.answer(getDispute, decided)
    await userEvent.click(within(dialog).getByRole('button', { name: 'Uphold and remove the play' }))
    expect(await screen.findByText('Dispute 17 is upheld.')).toBeInTheDocument()
    expect(server.requestsTo(decideDispute)[0]?.body).toEqual({
      outcome: 'upheld',
      reason: 'Another version was played.',
    })
    expect(screen.queryByRole('button', { name: 'Decide' })).not.toBeInTheDocument()
  })

  it('warns that a closed month keeps its plays, and shows the refusal in words', async () => {
    openDisputePage(disputeWith({ isMonthOpen: false }))
    const detail = 'November 2026 is calculated. Return it to open first.'
    server.handle(decideDispute, () => problemAnswer('month-closed', { detail }))
    const dialog = await askToUphold()
    expect(screen.getByText('November 2026 is closed')).toBeInTheDocument()
    await userEvent.click(within(dialog).getByRole('button', { name: 'Uphold and remove the play' }))
    expect(await within(dialog).findByText(detail)).toBeInTheDocument()
  })

  it('needs an outcome and a reason', async () => {
    openDisputePage(disputeWith({}))
    await userEvent.click(await screen.findByRole('button', { name: 'Decide' }))
    expect(await screen.findByText('Choose how the dispute ends.')).toBeInTheDocument()
    expect(screen.getByText('Reason is needed.')).toBeInTheDocument()
  })
})

describe('the page of a dispute', () => {
  it('lets the person who opened it write, and not decide', async () => {
    openDisputePage(disputeWith({ canDecide: false }), 'publisher')
    expect(await screen.findByText('The strings come in a bar later.')).toBeInTheDocument()
    expect(screen.queryByRole('button', { name: 'Decide' })).not.toBeInTheDocument()
    const answered = disputeWith({ canDecide: false })
    answered.messages.push({
      id: 'm1',
      at: answered.openedAt,
      authorName: 'Marta Quim',
      authorRole: 'publisher',
      text: 'From 08:15:22 on.',
    })
    server.answer(replyToDispute, answered)
    await userEvent.type(screen.getByRole('textbox', { name: 'Your message' }), 'From 08:15:22 on.')
    await userEvent.click(screen.getByRole('button', { name: 'Send the message' }))
    expect(await screen.findByText('Your message is sent.')).toBeInTheDocument()
    expect(screen.getByRole('textbox', { name: 'Your message' })).toHaveValue('')
    expect(screen.getByText('From 08:15:22 on.')).toBeInTheDocument()
  })
})
