import type { RowData } from '@tanstack/react-table'
import { useRef } from 'react'
import { classNames } from '../lib/class-names.ts'
import { useRowKeys } from '../lib/row-keys.ts'
import type { DataColumn } from './data-table-model.ts'
import type { DataTableInstance } from './use-data-table.ts'

type DataTableBodyProps<Row extends RowData> = {
  table: DataTableInstance<Row>
  columns: readonly DataColumn<Row>[]
  selectable: boolean
}

/** Rows; the arrow keys move between rows from any link or control in one. */
export function DataTableBody<Row extends RowData>({ table, columns, selectable }: DataTableBodyProps<Row>) {
  const body = useRef<HTMLTableSectionElement>(null)
  useRowKeys(body)
  const visible = table.getVisibleLeafColumns()
  return (
    <tbody ref={body}>
      {table.getRowModel().rows.map((row) => (
        <tr
          key={row.id}
          data-selected={row.getIsSelected() || undefined}
          className="group hover:bg-band data-selected:bg-band-strong"
        >
          {selectable && (
            <td className="border-b border-hairline px-3 py-2">
              <input
                type="checkbox"
                aria-label="Select this row"
                className="block size-4.5 accent-action"
                checked={row.getIsSelected()}
                onChange={(event) => row.toggleSelected(event.currentTarget.checked)}
              />
            </td>
          )}
          {visible.map(({ id }) => {
            const column = columns.find((candidate) => candidate.id === id)
            if (column === undefined) return null
            const className = classNames(
              'border-b border-hairline px-3 py-2 align-top font-normal',
              column.align === 'end' ? 'text-right' : 'text-left',
            )
            return column.rowHeader === true ? (
              <th key={id} scope="row" className={className}>
                {column.cell(row.original)}
              </th>
            ) : (
              <td key={id} className={className}>
                {column.cell(row.original)}
              </td>
            )
          })}
        </tr>
      ))}
    </tbody>
  )
}
