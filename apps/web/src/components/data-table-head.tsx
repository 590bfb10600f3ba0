import type { RowData } from '@tanstack/react-table'
import { ArrowDown, ArrowUp, ChevronsUpDown } from 'lucide-react'
import { classNames } from '../lib/class-names.ts'
import type { DataColumn } from './data-table-model.ts'
import type { DataTableInstance } from './use-data-table.ts'

type DataTableHeadProps<Row extends RowData> = {
  table: DataTableInstance<Row>
  columns: readonly DataColumn<Row>[]
  selectable: boolean
}

const headCell =
  'sticky top-0 z-10 border-b border-ink bg-band px-3 py-0 text-left align-bottom font-semibold'

const ariaSort = { asc: 'ascending', desc: 'descending' } as const

/** Head that stays in sight; a sortable column is a button that says how it sorts now. */
export function DataTableHead<Row extends RowData>({ table, columns, selectable }: DataTableHeadProps<Row>) {
  return (
    <thead>
      <tr>
        {selectable && (
          <th scope="col" className={classNames(headCell, 'w-10')}>
            <input
              type="checkbox"
              aria-label="Select all on this page"
              className="my-2 block size-4.5 accent-action"
              checked={table.getIsAllRowsSelected()}
              onChange={(event) => table.toggleAllRowsSelected(event.currentTarget.checked)}
            />
          </th>
        )}
        {table.getVisibleLeafColumns().map((column) => {
          const ours = columns.find((candidate) => candidate.id === column.id)
          const sorted = column.getIsSorted()
          const isEnd = ours?.align === 'end'
          return (
            <th
              key={column.id}
              scope="col"
              {...(sorted === false ? {} : { 'aria-sort': ariaSort[sorted] })}
              className={classNames(headCell, isEnd && 'text-right')}
              style={ours?.minWidth === undefined ? undefined : { minWidth: ours.minWidth }}
            >
              {column.getCanSort() ? (
                <button
                  type="button"
                  onClick={() => column.toggleSorting(sorted === 'asc')}
                  className={classNames(
                    'inline-flex min-h-10 items-center gap-1 text-left leading-tight hover:text-chestnut',
                    isEnd && 'flex-row-reverse text-right',
                  )}
                >
                  {ours?.header}
                  <SortMark sorted={sorted} />
                </button>
              ) : (
                <span className="inline-flex min-h-10 items-center leading-tight">{ours?.header}</span>
              )}
            </th>
          )
        })}
      </tr>
    </thead>
  )
}

function SortMark({ sorted }: { sorted: false | 'asc' | 'desc' }) {
  if (sorted === 'asc') return <ArrowUp aria-hidden className="size-4 shrink-0 text-chestnut" />
  if (sorted === 'desc') return <ArrowDown aria-hidden className="size-4 shrink-0 text-chestnut" />
  return <ChevronsUpDown aria-hidden className="size-3.5 shrink-0 text-slate" />
}
