import {
  getRecording,
  getRecordingPlays,
  listParties,
  listReferenceAudio,
  listWorks,
  setRecordingShares,
  updateRecording,
  type Role,
} from '@fieldfare/contracts'
import { screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { quim, recordingWith, wharf } from './catalogue-fixtures.ts'
import { catalogueRoutes } from './routes.tsx'

class SilentEvents extends EventTarget {
  close(): void {
    // Nothing is ever sent.
  }
}

let server: FakeServer

function openRecording(role: Role, canEdit: boolean) {
  const recording = recordingWith({ canEdit })
  server.answer(getRecording, recording)
  renderRoutes(catalogueRoutes, { at: `/recordings/${recording.id}`, role })
  return recording
}

beforeEach(() => {
  vi.stubGlobal('EventSource', SilentEvents)
  server = createFakeServer()
  server.answer(getRecordingPlays, { stations: [], months: [] })
  server.answer(listReferenceAudio, { items: [], total: 0, page: 1, pageSize: 50 })
  server.answer(listParties, { items: [quim, wharf], total: 2, page: 1, pageSize: 20 })
  server.answer(listWorks, { items: [], total: 0, page: 1, pageSize: 20 })
})

async function startEditingShares() {
  await userEvent.click(await screen.findByRole('button', { name: 'Change the shares' }))
  return screen.findByRole('group', { name: 'Share 1' })
}

describe('the shares of a recording', () => {
  it('are said in words when the whole is not claimed', async () => {
    openRecording('clerk', true)
    expect(await screen.findByText(/is claimed today;/)).toHaveTextContent(
      '50 % is claimed today; 50 % is held back.',
    )
  })

  it('are not saved below the whole until the rest is knowingly held back', async () => {
    const recording = openRecording('clerk', true)
    await startEditingShares()
    expect(screen.getByText('50 % will be held back')).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'Save the shares' }))
    expect(await screen.findByText(/Tick this to hold back the rest/)).toBeInTheDocument()
    expect(server.requestsTo(setRecordingShares)).toHaveLength(0)

    server.answer(setRecordingShares, recording)
    await userEvent.click(screen.getByRole('checkbox', { name: 'Hold back the rest' }))
    await userEvent.click(screen.getByRole('button', { name: 'Save the shares' }))
    expect(await screen.findByText('The shares are saved.')).toBeInTheDocument()
    expect(server.requestsTo(setRecordingShares)[0]?.body).toEqual({
      shares: [{ partyId: quim.id, sharePpm: 500_000, validFrom: '2020-01-01', validTo: null }],
      acceptIncomplete: true,
    })
  })

  it('are marked at once and cannot be saved above the whole', async () => {
    openRecording('clerk', true)
    const first = await startEditingShares()
    await userEvent.click(screen.getByRole('button', { name: 'Add a share' }))
    const second = screen.getByRole('group', { name: 'Share 2' })
    await userEvent.click(within(second).getByRole('combobox', { name: 'Party' }))
    await userEvent.click(await within(second).findByRole('option', { name: /Wharf Songs/ }))
    await userEvent.type(within(second).getByRole('textbox', { name: 'Share in %' }), '50.0001')
    expect(screen.getByText('0.0001 % too much')).toBeInTheDocument()
    expect(screen.getByRole('button', { name: 'Save the shares' })).toBeDisabled()

    const firstPercent = within(first).getByRole('textbox', { name: 'Share in %' })
    await userEvent.clear(firstPercent)
    await userEvent.type(firstPercent, '49,9999')
    expect(screen.getByText('All of it is claimed')).toBeInTheDocument()
    expect(screen.queryByRole('checkbox', { name: 'Hold back the rest' })).not.toBeInTheDocument()

    server.answer(setRecordingShares, recordingWith({}))
    await userEvent.click(screen.getByRole('button', { name: 'Save the shares' }))
    expect(await screen.findByText('The shares are saved.')).toBeInTheDocument()
    expect(server.requestsTo(setRecordingShares)[0]?.body).toMatchObject({
      shares: [
        { partyId: quim.id, sharePpm: 499_999 },
        { partyId: wharf.id, sharePpm: 500_001, validFrom: '2020-01-01', validTo: null },
      ],
      acceptIncomplete: false,
    })
  })

  it('show the complaint of the server at the row it is about', async () => {
    openRecording('clerk', true)
    const row = await startEditingShares()
    await userEvent.click(screen.getByRole('checkbox', { name: 'Hold back the rest' }))
    server.handle(setRecordingShares, () =>
      problemAnswer('validation-failed', {
        fieldErrors: [{ path: 'shares.0.partyId', message: 'This party does not exist.' }],
      }),
    )
    await userEvent.click(screen.getByRole('button', { name: 'Save the shares' }))
    expect(await within(row).findByText('This party does not exist.')).toBeInTheDocument()
  })
})

describe('the page of a recording', () => {
  it('offers a publisher nothing to change and does not ask for the audio files', async () => {
    openRecording('publisher', false)
    expect(await screen.findByRole('heading', { name: 'First light' })).toBeInTheDocument()
    expect(screen.queryByRole('button', { name: /^Change/ })).not.toBeInTheDocument()
    expect(screen.queryByLabelText('Send reference audio')).not.toBeInTheDocument()
    expect(server.requestsTo(listReferenceAudio)).toHaveLength(0)
  })

  it('keeps a taken ISRC beside its field', async () => {
    openRecording('clerk', true)
    await userEvent.click(await screen.findByRole('button', { name: 'Change' }))
    server.handle(updateRecording, () =>
      problemAnswer('conflict', {
        fieldErrors: [{ path: 'isrc', message: 'PT-A6Q-20-00047 is “Nine lanterns”.' }],
      }),
    )
    await userEvent.click(screen.getByRole('button', { name: 'Save the recording' }))
    const isrc = screen.getByRole('textbox', { name: 'ISRC' })
    expect(await screen.findByText('PT-A6Q-20-00047 is “Nine lanterns”.')).toBeInTheDocument()
    expect(isrc).toBeInvalid()
    expect(server.requestsTo(updateRecording)[0]?.body).toEqual({
      isrc: 'PTA6Q2000047',
      title: 'First light',
      artist: 'Marta Quim',
      durationSeconds: 187,
      workId: null,
    })
  })
})
