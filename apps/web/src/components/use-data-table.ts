import { useTable, type ReactTable, type RowData, type Updater } from '@tanstack/react-table'
import { useMemo } from 'react'
import { z } from 'zod'
import type { ListSearch } from '../lib/list-search.ts'
import { useStoredValue } from '../lib/stored-value.ts'
import {
  columnDefinitions,
  dataTableFeatures,
  sortingFromText,
  sortingToText,
  type DataColumn,
  type DataTableFeatures,
} from './data-table-model.ts'

/** Selected row ids with the way to change them; keep it in state of the page. */
export type RowSelection = {
  selectedIds: readonly string[]
  onChange: (selectedIds: string[]) => void
}

const visibilitySchema = z.record(z.string(), z.boolean())

export type DataTableInstance<Row extends RowData> = ReactTable<DataTableFeatures, Row>

type UseDataTableOptions<Row extends RowData> = {
  /** Names the remembered column choice: "detections". */
  name: string
  columns: readonly DataColumn<Row>[]
  rows: readonly Row[]
  rowId: (row: Row) => string
  search: Pick<ListSearch, 'sort' | 'setSort'> | undefined
  selection: RowSelection | undefined
}

function settle<Value>(updater: Updater<Value>, current: Value): Value {
  return updater instanceof Function ? updater(current) : updater
}

/** TanStack Table over rows the server has paged and sorted; state lives in the address and in the browser's memory. */
export function useDataTable<Row extends RowData>(options: UseDataTableOptions<Row>): DataTableInstance<Row> {
  const { columns, rows, rowId, search, selection } = options
  const definitions = useMemo(() => columnDefinitions(columns), [columns])
  const data = useMemo(() => [...rows], [rows])
  const initialVisibility = useMemo(
    () => Object.fromEntries(columns.map((column) => [column.id, column.hiddenAtFirst !== true])),
    [columns],
  )
  const [chosen, setChosen] = useStoredValue(`fieldfare-columns-${options.name}`, visibilitySchema, {})
  const columnVisibility = { ...initialVisibility, ...chosen }
  const sorting = sortingFromText(search?.sort ?? '')
  const rowSelection = Object.fromEntries((selection?.selectedIds ?? []).map((id) => [id, true as const]))

  return useTable({
    features: dataTableFeatures,
    columns: definitions,
    data,
    getRowId: rowId,
    manualSorting: true,
    enableSortingRemoval: false,
    enableMultiSort: false,
    enableRowSelection: selection !== undefined,
    state: { columnVisibility, sorting, rowSelection },
    onColumnVisibilityChange: (updater) => setChosen(settle(updater, columnVisibility)),
    onSortingChange: (updater) => search?.setSort(sortingToText(settle(updater, sorting))),
    onRowSelectionChange: (updater) => {
      const next = settle(updater, rowSelection)
      selection?.onChange(Object.keys(next))
    },
  })
}
