import { catalogueCsvColumns } from '@fieldfare/contracts'
import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { renderRoutes } from '../../testing/render-page.tsx'
import { emptyTemplate } from './csv-columns.ts'
import { importsRoutes } from './routes.tsx'

const complaint = 'The columns of the first line do not fit – missing: isrc.'

/** Answers every upload with one refusal: jsdom's own request would go to the network. */
class RefusingRequest extends EventTarget {
  readonly upload = new EventTarget()
  status = 0
  responseText = ''
  open(): void {
    // Nowhere to go.
  }
  setRequestHeader(): void {
    // Nothing to say.
  }
  send(): void {
    this.status = 422
    this.responseText = JSON.stringify({
      type: 'about:blank',
      code: 'file-refused',
      title: 'The file cannot be used',
      status: 422,
      detail: complaint,
      correlationId: 'test',
      fieldErrors: [{ path: 'file', message: complaint }],
    })
    queueMicrotask(() => this.dispatchEvent(new Event('load')))
  }
}

beforeEach(() => {
  vi.stubGlobal('XMLHttpRequest', RefusingRequest)
})

describe('importing a CSV file', () => {
  it('shows what is wrong with the whole file at the field', async () => {
    renderRoutes(importsRoutes, { at: '/imports/new' })
    const input = await screen.findByLabelText('CSV file')
    await userEvent.upload(input, new File(['a,b\n1,2\n'], 'catalogue.csv', { type: 'text/csv' }))
    await userEvent.click(screen.getByRole('button', { name: 'Import the file' }))
    expect(await screen.findByText(complaint)).toBeInTheDocument()
    expect(input).toHaveAccessibleDescription(expect.stringContaining(complaint))
    expect(screen.getAllByText(complaint)).toHaveLength(1)
  })

  it('asks for a file before sending anything', async () => {
    renderRoutes(importsRoutes, { at: '/imports/new' })
    await userEvent.click(await screen.findByRole('button', { name: 'Import the file' }))
    expect(await screen.findByText('Choose a file first.')).toBeInTheDocument()
  })

  it('explains every column, and hands them out as an empty file', async () => {
    renderRoutes(importsRoutes, { at: '/imports/new' })
    const table = await screen.findByRole('table', { name: 'Columns of the file, in order' })
    for (const column of catalogueCsvColumns) expect(table).toHaveTextContent(column)
    const reader = new FileReader()
    const read = new Promise((resolve) => reader.addEventListener('load', () => resolve(reader.result)))
    reader.readAsText(emptyTemplate())
    expect(await read).toBe(`${catalogueCsvColumns.join(',')}\r\n`)
  })
})
