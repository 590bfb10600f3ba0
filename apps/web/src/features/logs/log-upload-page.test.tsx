import { listStations, stationIdSchema, type ProblemCode, type StationLogView } from '@fieldfare/contracts'
import { act, fireEvent, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { idOf, logView, stationRef, stationView } from '../../testing/airtime-fixtures.ts'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { logsRoutes } from './routes.tsx'

/** Uploads go through XMLHttpRequest; this one keeps them until the test answers. */
class FakeUpload extends EventTarget {
  static all: FakeUpload[] = []
  upload = new EventTarget()
  address = ''
  form = new FormData()
  status = 0
  responseText = ''
  open(_method: string, address: string): void {
    this.address = address
  }
  setRequestHeader(): void {
    // The header that proves where a request comes from is tested with the client.
  }
  send(form: FormData): void {
    this.form = form
    FakeUpload.all.push(this)
  }
  abort(): void {
    this.dispatchEvent(new Event('abort'))
  }
  progress(loaded: number, total: number): void {
    act(() => {
      this.upload.dispatchEvent(new ProgressEvent('progress', { loaded, total }))
    })
  }
  answer(status: number, body: string): void {
    act(() => {
      this.status = status
      this.responseText = body
      this.dispatchEvent(new Event('load'))
    })
  }
  accept(log: StationLogView): void {
    this.answer(200, JSON.stringify(log))
  }
  async refuse(code: ProblemCode, extra: Parameters<typeof problemAnswer>[1]): Promise<void> {
    const problem = problemAnswer(code, extra)
    this.answer(problem.status, await problem.text())
  }
}

async function nextUpload(number = 1): Promise<FakeUpload> {
  await waitFor(() => expect(FakeUpload.all).toHaveLength(number))
  const upload = FakeUpload.all[number - 1]
  if (upload === undefined) throw new Error('Nothing was sent.')
  return upload
}

let server: FakeServer

beforeEach(() => {
  FakeUpload.all = []
  vi.stubGlobal('XMLHttpRequest', FakeUpload)
  server = createFakeServer()
  server.answer(listStations, { items: [stationView()] })
})

const named = (name: string) => new File(['sound'], name, { type: 'audio/wav' })

async function openWith(...names: string[]) {
  const view = renderRoutes(logsRoutes, { at: '/logs/new', role: 'uploader' })
  await userEvent.upload(await screen.findByLabelText('Recordings'), names.map(named))
  return view
}

const otherStation = { ...stationView(), id: stationIdSchema.parse(idOf(5)), name: 'Siskin Coast' }

const rowOf = (name: string) => {
  const row = screen.getAllByRole('listitem').find((item) => item.textContent.includes(name))
  if (row === undefined) throw new Error(`${name} is not listed.`)
  return within(row)
}

describe('sending station logs', () => {
  it('suggests the start a file name states, to be checked, and leaves others empty', async () => {
    await openWith('2026-11-03_06-00.wav', 'morning.wav')

    const suggested = rowOf('2026-11-03_06-00.wav').getByLabelText('Recording begins')
    expect(suggested).toHaveValue('2026-11-03T06:00')
    expect(suggested).toHaveAccessibleDescription(/Read from the file name\. Check/)
    expect(rowOf('morning.wav').getByLabelText('Recording begins')).toHaveValue('')
    expect(rowOf('morning.wav').getByText(/Europe\/Lisbon/)).toBeVisible()
  })

  it('sends one after the other with the station’s zone and links each to its analysis', async () => {
    await openWith('20261103T060000.wav', '20261103T070000.wav')
    await userEvent.click(screen.getByRole('button', { name: 'Send 2 files' }))

    const first = await nextUpload()
    expect(first.address).toBe(`/api/stations/${stationRef.id}/logs`)
    expect(Object.fromEntries([...first.form].filter(([name]) => name !== 'file'))).toEqual({
      startedAtLocal: '2026-11-03T06:00:00',
      timeZone: 'Europe/Lisbon',
    })
    first.progress(250, 1000)
    expect(await screen.findByRole('progressbar', { name: 'Sending' })).toHaveAttribute('aria-valuenow', '25')
    first.accept(logView({ status: 'queued' }))
    const second = await nextUpload(2)
    second.accept(logView({ id: idOf(11), status: 'queued' }))

    expect(await screen.findByText('2 of 2 files arrived.')).toBeVisible()
    const links = screen.getAllByRole('link', { name: 'Follow its analysis' })
    expect(links.map((link) => link.getAttribute('href'))).toEqual([`/logs/${idOf(10)}`, `/logs/${idOf(11)}`])
    expect(screen.getByRole('link', { name: 'See the station logs' })).toBeVisible()
  })

  it('asks for a missing start at its file and sends the others', async () => {
    await openWith('morning.wav', '20261103T070000.wav')
    await userEvent.click(screen.getByRole('button', { name: 'Send 2 files' }))

    const sent = await nextUpload()
    sent.accept(logView({ status: 'queued' }))

    expect(await screen.findByText('1 of 2 files arrived.')).toBeVisible()
    const field = rowOf('morning.wav').getByLabelText('Recording begins')
    expect(field).toHaveAccessibleDescription(/Enter the date and time at which this recording begins/)
    expect(FakeUpload.all).toHaveLength(1)
  })

  it('asks which of two equal times is meant only when the server needs to know', async () => {
    await openWith('2026-10-25_01-30.wav')
    expect(screen.queryByRole('radio')).toBeNull()
    await userEvent.click(screen.getByRole('button', { name: 'Send 1 file' }))
    const first = await nextUpload()
    await first.refuse('local-time-invalid', {
      fieldErrors: [{ path: 'occurrence', message: 'This time happened twice. Say which it was.' }],
    })

    const question = await screen.findByRole('group', { name: /happened twice\. Which was it/ })
    expect(within(question).getByText('This time happened twice. Say which it was.')).toBeVisible()
    await userEvent.click(within(question).getByRole('radio', { name: /^The later/ }))
    await userEvent.click(screen.getByRole('button', { name: 'Send 1 file' }))

    const second = await nextUpload(2)
    expect(second.form.get('occurrence')).toBe('later')
    expect(second.form.get('file')).toBeInstanceOf(File)
  })

  it('says at the file why it was refused and sends it again without choosing it again', async () => {
    await openWith('20261103T060000.wav')
    await userEvent.click(screen.getByRole('button', { name: 'Send 1 file' }))
    const first = await nextUpload()
    await first.refuse('duplicate-log', { detail: 'This very recording is held already: air.wav.' })

    const row = rowOf('20261103T060000.wav')
    expect(await row.findByRole('alert')).toHaveTextContent('This very recording is held already: air.wav.')
    await userEvent.click(row.getByRole('button', { name: 'Send this file again' }))

    const second = await nextUpload(2)
    expect(second.form.get('startedAtLocal')).toBe('2026-11-03T06:00:00')
  })

  it('puts a complaint about the start at its field', async () => {
    await openWith('20261103T060000.wav')
    await userEvent.click(screen.getByRole('button', { name: 'Send 1 file' }))
    const first = await nextUpload()
    await first.refuse('validation-failed', {
      fieldErrors: [{ path: 'body.startedAtLocal', message: 'A log cannot begin in the future.' }],
    })

    const field = await screen.findByLabelText('Recording begins')
    await waitFor(() => expect(field).toHaveAccessibleDescription(/A log cannot begin in the future/))
    fireEvent.change(field, { target: { value: '2026-11-02T06:00:00' } })
    expect(field).toBeValid()
  })

  it('warns before a page with an upload under way is left', async () => {
    const { router } = await openWith('20261103T060000.wav')
    await userEvent.click(screen.getByRole('button', { name: 'Send 1 file' }))
    await nextUpload()

    await userEvent.click(screen.getByRole('link', { name: 'Station logs' }))

    expect(await screen.findByRole('dialog', { name: 'Leave while files are being sent?' })).toBeVisible()
    expect(router.state.location.pathname).toBe('/logs/new')
  })

  it('needs a station where there are several', async () => {
    server.answer(listStations, {
      items: [stationView(), otherStation],
    })
    await openWith('20261103T060000.wav')
    await userEvent.click(screen.getByRole('button', { name: 'Send 1 file' }))

    expect(screen.getByLabelText('Station')).toHaveAccessibleDescription(/Choose the station/)
    expect(FakeUpload.all).toHaveLength(0)
  })
})
