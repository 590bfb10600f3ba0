import type { RowData } from '@tanstack/react-table'
import { Columns3 } from 'lucide-react'
import { useId } from 'react'
import type { DataColumn } from './data-table-model.ts'
import type { DataTableInstance } from './use-data-table.ts'

type ColumnChoiceProps<Row extends RowData> = {
  table: DataTableInstance<Row>
  columns: readonly DataColumn<Row>[]
}

/** Which columns to show; remembered by this browser. */
export function ColumnChoice<Row extends RowData>({ table, columns }: ColumnChoiceProps<Row>) {
  const panelId = useId()
  const hideable = table.getAllLeafColumns().filter((column) => column.getCanHide())
  if (hideable.length < 2) return null
  return (
    <div className="no-print relative">
      <button
        type="button"
        popoverTarget={panelId}
        className="inline-flex min-h-10 items-center gap-2 rounded-md border border-edge bg-sheet px-3.5 py-1.5 text-[0.95rem] font-semibold hover:border-chestnut hover:text-chestnut"
      >
        <Columns3 aria-hidden className="size-4" />
        Columns
      </button>
      <div
        id={panelId}
        popover="auto"
        className="m-auto border border-edge bg-paper p-4 text-ink shadow-lift sm:max-h-96 sm:overflow-auto"
      >
        <fieldset className="grid gap-2">
          <legend className="mb-2 font-serif text-lg">Columns shown</legend>
          {hideable.map((column) => (
            <label key={column.id} className="flex items-center gap-2.5">
              <input
                type="checkbox"
                className="size-4.5 accent-action"
                checked={column.getIsVisible()}
                onChange={(event) => column.toggleVisibility(event.currentTarget.checked)}
              />
              {columns.find((candidate) => candidate.id === column.id)?.header}
            </label>
          ))}
        </fieldset>
      </div>
    </div>
  )
}
