import {
  columnVisibilityFeature,
  rowSelectionFeature,
  rowSortingFeature,
  tableFeatures,
  type ColumnDef,
  type RowData,
  type SortingState,
} from '@tanstack/react-table'
import type { ReactNode } from 'react'

/** The table features in use; paging and filtering are the server's, so their row models are left out. */
export const dataTableFeatures = tableFeatures({
  columnVisibilityFeature,
  rowSelectionFeature,
  rowSortingFeature,
})
export type DataTableFeatures = typeof dataTableFeatures

export type DataColumn<Row> = {
  /** Name of the column; for a sortable one the name the endpoint sorts by. */
  id: string
  header: string
  cell: (row: Row) => ReactNode
  sortable?: boolean
  /** 'end' for figures. */
  align?: 'start' | 'end'
  /** This cell names the row; give it to one column, usually the one with the link. */
  rowHeader?: boolean
  /** Always shown. */
  fixed?: boolean
  /** Not shown until chosen. */
  hiddenAtFirst?: boolean
  /** Minimum width, any CSS length. */
  minWidth?: string
}

/** Our columns as TanStack column definitions. */
export function columnDefinitions<Row extends RowData>(
  columns: readonly DataColumn<Row>[],
): ColumnDef<DataTableFeatures, Row>[] {
  return columns.map((column) => ({
    id: column.id,
    header: column.header,
    accessorFn: (row): unknown => row,
    enableSorting: column.sortable === true,
    enableHiding: column.fixed !== true && column.rowHeader !== true,
  }))
}

/** '-startedAt' in the address is the column startedAt, descending. */
export function sortingFromText(sort: string): SortingState {
  if (sort === '') return []
  return sort.startsWith('-') ? [{ id: sort.slice(1), desc: true }] : [{ id: sort, desc: false }]
}

export function sortingToText(sorting: SortingState): string {
  const [first] = sorting
  if (first === undefined) return ''
  return first.desc ? `-${first.id}` : first.id
}
