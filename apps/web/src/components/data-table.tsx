import type { RowData } from '@tanstack/react-table'
import { Download } from 'lucide-react'
import { useId, type ReactNode } from 'react'
import { classNames } from '../lib/class-names.ts'
import { formatCount } from '../lib/format.ts'
import type { ListSearch } from '../lib/list-search.ts'
import { Button, DownloadButton } from './button.tsx'
import { ColumnChoice } from './column-choice.tsx'
import { DataTableBody } from './data-table-body.tsx'
import { DataTableHead } from './data-table-head.tsx'
import type { DataColumn } from './data-table-model.ts'
import { Pagination } from './pagination.tsx'
import { EmptyState, ErrorState, LoadingState } from './states.tsx'
import { useDataTable, type RowSelection } from './use-data-table.ts'

export type TableAnswer<Row> = {
  data: { items: readonly Row[]; total?: number } | undefined
  error: Error | null
  isFetching: boolean
  refetch: () => unknown
}

/** What a table needs of useListSearch, whatever its filters are called. */
export type TableSearch = Pick<
  ListSearch,
  'page' | 'pageSize' | 'sort' | 'hasFilters' | 'setPage' | 'setPageSize' | 'setSort' | 'clearFilters'
>

export type DataTableProps<Row extends RowData> = {
  /** Names the remembered column choice; unique in the application. */
  name: string
  /** Says what the table lists; read out, shown above it unless `captionHidden`. */
  caption: string
  captionHidden?: boolean
  /** What one row is, in the plural: "detections". */
  noun: string
  /** At module level: a new array at each render makes the table start over. */
  columns: readonly DataColumn<Row>[]
  /** A query's result, with `placeholderData: keepPreviousData` so that paging does not flicker. */
  query: TableAnswer<Row>
  rowId: (row: Row) => string
  /** From useListSearch; left out for short lists that come whole. */
  search?: TableSearch
  selection?: RowSelection
  /** Shown while rows are selected. */
  bulkActions?: ReactNode
  /** Address of the CSV with exactly the listed rows. */
  exportHref?: string
  /** When there is nothing at all, with a next step. Filters that leave nothing are explained by the table itself. */
  empty: ReactNode
}

const noRows: readonly never[] = []

/** The table of every list: paged, sorted and filtered by the server, all of it in the address. */
export function DataTable<Row extends RowData>(props: DataTableProps<Row>) {
  const { query, search, selection, caption, noun, columns } = props
  const captionId = useId()
  const rows: readonly Row[] = query.data?.items ?? noRows
  const table = useDataTable({ ...props, rows, search, selection })

  if (query.data === undefined) {
    return query.error === null ? (
      <LoadingState>Fetching {noun}</LoadingState>
    ) : (
      <ErrorState error={query.error} onRetry={() => void query.refetch()} />
    )
  }
  const total = query.data.total ?? rows.length

  return (
    <div className="grid gap-2">
      <div className="flex flex-wrap items-end justify-between gap-3">
        <p id={captionId} className={props.captionHidden === true ? 'sr-only' : 'font-serif text-lg'}>
          {caption}
        </p>
        <div className="ml-auto flex flex-wrap gap-2">
          <ColumnChoice table={table} columns={columns} />
          {props.exportHref !== undefined && (
            <DownloadButton icon={Download} href={props.exportHref}>
              CSV
            </DownloadButton>
          )}
        </div>
      </div>
      {query.error !== null && <ErrorState error={query.error} onRetry={() => void query.refetch()} />}
      {selection !== undefined && selection.selectedIds.length > 0 && (
        <BulkBar selection={selection} actions={props.bulkActions} noun={noun} />
      )}
      {rows.length === 0 ? (
        <NothingListed search={search} noun={noun} empty={props.empty} />
      ) : (
        // A scrolling region must take the focus so that arrow keys can scroll it (WCAG 2.1.1).
        <div
          role="region"
          aria-labelledby={captionId}
          // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- the comment above
          tabIndex={0}
          className={classNames(
            'print-whole relative max-h-[78dvh] overflow-auto border-y border-ink transition-opacity',
            query.isFetching && 'opacity-70',
          )}
        >
          <table
            aria-labelledby={captionId}
            aria-busy={query.isFetching}
            className="w-full border-separate border-spacing-0 text-[0.95rem]"
          >
            <DataTableHead table={table} columns={columns} selectable={selection !== undefined} />
            <DataTableBody table={table} columns={columns} selectable={selection !== undefined} />
          </table>
        </div>
      )}
      {search !== undefined && total > 0 && (
        <Pagination
          page={search.page}
          pageSize={search.pageSize}
          total={total}
          noun={noun}
          onPageChange={search.setPage}
          onPageSizeChange={search.setPageSize}
        />
      )}
    </div>
  )
}

function BulkBar({
  selection,
  actions,
  noun,
}: {
  selection: RowSelection
  actions: ReactNode
  noun: string
}) {
  return (
    <div
      role="group"
      aria-label={`Actions for the selected ${noun}`}
      className="flex flex-wrap items-center gap-3 bg-band px-3 py-2"
    >
      <p aria-live="polite">
        <span className="figures">{formatCount(selection.selectedIds.length)}</span> selected
      </p>
      {actions}
      <Button tone="quiet" onClick={() => selection.onChange([])}>
        Select none
      </Button>
    </div>
  )
}

function NothingListed({
  search,
  noun,
  empty,
}: {
  search: TableSearch | undefined
  noun: string
  empty: ReactNode
}) {
  if (search === undefined || (!search.hasFilters && search.page === 1)) return empty
  if (search.page > 1) {
    return (
      <EmptyState
        title={`No ${noun} on this page`}
        action={<Button onClick={() => search.setPage(1)}>Go to the first page</Button>}
      />
    )
  }
  return (
    <EmptyState
      title={`No ${noun} match these filters`}
      action={<Button onClick={search.clearFilters}>Clear filters</Button>}
    />
  )
}
