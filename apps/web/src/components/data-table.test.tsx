import { queryOptions, useQuery } from '@tanstack/react-query'
import { screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { describe, expect, it, vi } from 'vitest'
import { useListSearch, type ListSearch } from '../lib/list-search.ts'
import { renderElement } from '../testing/render-page.tsx'
import { DataTable } from './data-table.tsx'
import type { DataColumn } from './data-table-model.ts'
import { EmptyState } from './states.tsx'
import { TextLink } from './text-link.tsx'

type Row = { id: string; title: string; seconds: number }
type Answer = { items: Row[]; total: number }

const columns: readonly DataColumn<Row>[] = [
  {
    id: 'title',
    header: 'Title',
    sortable: true,
    rowHeader: true,
    cell: (row) => <TextLink to={`/${row.id}`}>{row.title}</TextLink>,
  },
  { id: 'seconds', header: 'Length', sortable: true, align: 'end', cell: (row) => row.seconds },
  { id: 'note', header: 'Note', hiddenAtFirst: true, cell: () => 'noted' },
]
const rows: Row[] = [
  { id: 'a', title: 'Harbour lights', seconds: 200 },
  { id: 'b', title: 'Nine', seconds: 100 },
]

type Fetch = (query: ListSearch['query']) => Promise<Answer>

function listQuery(query: ListSearch['query'], fetchRows: Fetch) {
  return queryOptions({ queryKey: ['list', query], queryFn: () => fetchRows(query), staleTime: 0 })
}

function TestList({ fetchRows }: { fetchRows: Fetch }) {
  const search = useListSearch({ filters: ['status'], sort: '-seconds' })
  const query = useQuery(listQuery(search.query, fetchRows))
  const [selectedIds, setSelectedIds] = useState<string[]>([])
  return (
    <DataTable
      name="test"
      caption="Recordings"
      noun="recordings"
      columns={columns}
      query={query}
      rowId={(row) => row.id}
      search={search}
      selection={{ selectedIds, onChange: setSelectedIds }}
      bulkActions={<span>Bulk for {selectedIds.join('+')}</span>}
      exportHref="/api/x.csv"
      empty={<EmptyState title="Nothing catalogued" />}
    />
  )
}

const answerRows: Fetch = async () => ({ items: rows, total: 120 })

describe('DataTable', () => {
  it('asks the server for what the address says', async () => {
    const fetchRows = vi.fn(answerRows)
    renderElement(<TestList fetchRows={fetchRows} />, { at: '/?page=2&sort=title&status=failed' })

    await screen.findByRole('table', { name: 'Recordings' })

    expect(fetchRows).toHaveBeenCalledWith({ page: 2, pageSize: 50, sort: 'title', status: 'failed' })
  })

  it('sorts by writing the column to the address, then turns the order, and begins at page one', async () => {
    const { router } = renderElement(<TestList fetchRows={answerRows} />, { at: '/?page=2' })

    await userEvent.click(await screen.findByRole('button', { name: 'Title' }))
    expect(router.state.location.search).toBe('?sort=title')
    await userEvent.click(await screen.findByRole('button', { name: 'Title' }))

    await waitFor(() => expect(router.state.location.search).toBe('?sort=-title'))
    expect(await screen.findByRole('columnheader', { name: 'Title' })).toHaveAttribute(
      'aria-sort',
      'descending',
    )
  })

  it('goes to the next page in the address and says which rows are shown', async () => {
    const { router } = renderElement(<TestList fetchRows={answerRows} />)

    await userEvent.click(await screen.findByRole('button', { name: 'Next page' }))

    await waitFor(() => expect(router.state.location.search).toBe('?page=2'))
    expect(await screen.findByText('51–100')).toBeVisible()
  })

  it('remembers which columns are shown', async () => {
    const { unmount } = renderElement(<TestList fetchRows={answerRows} />)
    await screen.findByRole('table')
    expect(screen.queryByRole('columnheader', { name: 'Note' })).not.toBeInTheDocument()

    await userEvent.click(screen.getByRole('checkbox', { name: 'Note', hidden: true }))
    expect(screen.getByRole('columnheader', { name: 'Note' })).toBeInTheDocument()
    unmount()
    renderElement(<TestList fetchRows={answerRows} />)

    expect(await screen.findByRole('columnheader', { name: 'Note' })).toBeInTheDocument()
  })

  it('offers actions for the selected rows by their ids', async () => {
    renderElement(<TestList fetchRows={answerRows} />)

    await userEvent.click(await screen.findByRole('checkbox', { name: 'Select all on this page' }))

    expect(screen.getByText('Bulk for a+b')).toBeVisible()
    await userEvent.click(screen.getByRole('button', { name: 'Select none' }))
    expect(screen.queryByText(/Bulk for/)).not.toBeInTheDocument()
  })

  it('moves from row to row by the arrow keys', async () => {
    renderElement(<TestList fetchRows={answerRows} />)
    const first = await screen.findByRole('link', { name: 'Harbour lights' })

    first.focus()
    await userEvent.keyboard('{ArrowDown}')

    expect(screen.getByRole('link', { name: 'Nine' })).toHaveFocus()
  })

  it('explains filters that leave nothing and clears them', async () => {
    const fetchRows: Fetch = async (query) =>
      query['status'] === undefined ? { items: rows, total: 2 } : { items: [], total: 0 }
    renderElement(<TestList fetchRows={fetchRows} />, { at: '/?status=failed' })

    expect(await screen.findByText('No recordings match these filters')).toBeVisible()
    await userEvent.click(screen.getByRole('button', { name: 'Clear filters' }))

    expect(within(await screen.findByRole('table')).getByText('Nine')).toBeVisible()
  })

  it('shows the empty state of the page when there is nothing at all', async () => {
    renderElement(<TestList fetchRows={async () => ({ items: [], total: 0 })} />)

    expect(await screen.findByText('Nothing catalogued')).toBeVisible()
  })

  it('says what failed and tries again', async () => {
    const fetchRows = vi.fn<Fetch>(answerRows).mockRejectedValueOnce(new Error('broken'))
    renderElement(<TestList fetchRows={fetchRows} />)

    await userEvent.click(await screen.findByRole('button', { name: 'Try again' }))

    expect(await screen.findByRole('table')).toBeVisible()
  })
})
