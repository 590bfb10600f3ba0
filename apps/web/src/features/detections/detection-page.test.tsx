import {
  getDetection,
  getDetectionClip,
  listDetections,
  openDispute,
  reviewDetection,
  type Role,
} from '@fieldfare/contracts'
import { screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { detectionDetail, detectionView, idOf, pageOfRows } from '../../testing/airtime-fixtures.ts'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { detectionsRoutes } from './routes.tsx'

let server: FakeServer

beforeEach(() => {
  server = createFakeServer()
})

async function openDetection(role: Role, search = '') {
  const view = renderRoutes(detectionsRoutes, { at: `/detections/${idOf(20)}${search}`, role })
  await screen.findByRole('heading', { level: 1, name: 'Hedgerow Morning' })
  return view
}

describe('one detection', () => {
  it('explains in words how sure the engine is and how the moments line up', async () => {
    server.answer(getDetection, detectionDetail({ confidence: 5.4 }))
    await openDetection('auditor')

    expect(
      screen.getByText('About one false alarm as strong as this is expected in 100,000 hours of log.'),
    ).toBeVisible()
    expect(screen.getByText(/640 moments agree, 120 of them drawn/)).toBeVisible()
    const table = screen.getByRole('table', { name: 'Moments where log and reference agree' })
    expect(within(table).getAllByRole('row')).toHaveLength(121)
  })

  it('confirms and shows the new state', async () => {
    server.answer(getDetection, detectionDetail())
    server.answer(reviewDetection, detectionDetail({ reviewState: 'confirmed' }))
    await openDetection('clerk')

    await userEvent.click(screen.getByRole('button', { name: 'Confirm' }))

    expect(await screen.findByText('The detection is confirmed.')).toBeVisible()
    expect(screen.getByText('Confirmed')).toBeVisible()
    expect(screen.queryByRole('button', { name: 'Confirm' })).toBeNull()
    expect(server.requestsTo(reviewDetection)[0]?.body).toEqual({ outcome: 'confirmed', reason: '' })
  })

  it('asks for a reason before it rejects', async () => {
    server.answer(getDetection, detectionDetail())
    server.answer(reviewDetection, detectionDetail({ reviewState: 'rejected' }))
    await openDetection('clerk')

    await userEvent.click(screen.getByRole('button', { name: 'Reject' }))
    expect(await screen.findByText('Say why it is rejected.')).toBeVisible()
    expect(server.requestsTo(reviewDetection)).toHaveLength(0)

    await userEvent.type(screen.getByLabelText('Reason'), 'Only hummed.')
    await userEvent.click(screen.getByRole('button', { name: 'Reject' }))

    expect(await screen.findByText('The detection is rejected.')).toBeVisible()
    expect(server.requestsTo(reviewDetection)[0]?.body).toEqual({
      outcome: 'rejected',
      reason: 'Only hummed.',
    })
  })

  it('says that the month is closed and keeps the reason typed', async () => {
    server.answer(getDetection, detectionDetail())
    server.handle(reviewDetection, () =>
      problemAnswer('month-closed', { detail: 'November 2026 is approved. Open it again first.' }),
    )
    await openDetection('clerk')
    await userEvent.type(screen.getByLabelText('Reason'), 'Only hummed.')

    await userEvent.click(screen.getByRole('button', { name: 'Reject' }))

    expect(await screen.findByRole('alert')).toHaveTextContent(
      'November 2026 is approved. Open it again first.',
    )
    expect(screen.getByLabelText('Reason')).toHaveValue('Only hummed.')
    expect(screen.getByText('Waiting for review')).toBeVisible()
  })

  it('shows an uploader the evidence and none of the decisions', async () => {
    server.answer(getDetection, detectionDetail({ canReview: false }))
    await openDetection('uploader')

    expect(screen.getByRole('button', { name: 'Play both in step' })).toBeVisible()
    expect(screen.queryByRole('button', { name: /Confirm|Reject|Dispute/ })).toBeNull()
    expect(screen.queryByRole('link', { name: 'Hedgerow Morning' })).toBeNull()
  })

  it('lets an auditor dispute the play and says why it could not be opened', async () => {
    server.answer(
      getDetection,
      detectionDetail({ canReview: false, canDispute: true, play: { id: idOf(30), status: 'counted' } }),
    )
    server.handle(openDispute, () => problemAnswer('conflict', { detail: 'It is in dispute already.' }))
    await openDetection('auditor')

    await userEvent.click(screen.getByRole('button', { name: 'Dispute this play' }))
    await userEvent.type(screen.getByLabelText('What is wrong with this play'), 'A cover version.')
    await userEvent.click(screen.getByRole('button', { name: 'Open the dispute' }))

    expect(await screen.findByRole('alert')).toHaveTextContent('It is in dispute already.')
    expect(server.requestsTo(openDispute)[0]?.body).toEqual({
      playId: idOf(30),
      reason: 'A cover version.',
    })
  })

  it('goes through the list it was opened from by key, but not while somebody types', async () => {
    server.answer(getDetection, detectionDetail())
    server.answer(
      listDetections,
      pageOfRows([detectionView(), detectionView({ id: idOf(21) }), detectionView({ id: idOf(22) })]),
    )
    const { router } = await openDetection('clerk', '?state=waiting')
    await screen.findByText('1 of 3 on this page of the list')

    await userEvent.keyboard('r')
    expect(screen.getByLabelText('Reason')).toHaveFocus()
    await userEvent.keyboard('n')
    expect(screen.getByLabelText('Reason')).toHaveValue('n')
    expect(router.state.location.pathname).toBe(`/detections/${idOf(20)}`)
    await userEvent.clear(screen.getByLabelText('Reason'))

    await userEvent.click(document.body)
    await userEvent.keyboard('n')
    await waitFor(() => expect(router.state.location.pathname).toBe(`/detections/${idOf(21)}`))
    expect(router.state.location.search).toBe('?state=waiting')
  })

  it('says in words why a clip cannot be heard', async () => {
    server.answer(getDetection, detectionDetail({ hasReferenceAudio: false }))
    server.handle(getDetectionClip, () =>
      problemAnswer('audio-expired', { detail: 'The audio of this station log is no longer kept.' }),
    )
    vi.spyOn(HTMLMediaElement.prototype, 'load').mockImplementation(function load(this: HTMLMediaElement) {
      this.dispatchEvent(new Event('error'))
    })
    vi.spyOn(HTMLMediaElement.prototype, 'pause').mockReturnValue(undefined)
    await openDetection('clerk')
    expect(screen.getByText('No reference audio is kept')).toBeVisible()

    await userEvent.click(screen.getByRole('button', { name: 'Play the log' }))

    expect(await screen.findByRole('alert')).toHaveTextContent(
      'The audio of this station log is no longer kept.',
    )
    expect(screen.getByRole('button', { name: 'Play the log' })).toBeEnabled()
  })
})
