import { Table2 } from 'lucide-react'
import { useId, useState, type ReactNode } from 'react'
import { classNames } from '../lib/class-names.ts'
import { Button } from './button.tsx'

export type ChartColumn<Row> = { header: string; cell: (row: Row) => ReactNode; align?: 'start' | 'end' }

export type ChartFrameProps<Row> = {
  /** Says what is seen: "Identified share fell after the 14th", or at least what is drawn. */
  title: string
  lead?: ReactNode
  rows: readonly Row[]
  rowId: (row: Row) => string
  /** The table behind the chart. */
  columns: readonly ChartColumn<Row>[]
  /** A Recharts ResponsiveContainer of fixed height. */
  children: ReactNode
}

/** A chart with a title, its picture hidden from readers that cannot see it, and the same data as a table. */
export function ChartFrame<Row>({ title, lead, rows, rowId, columns, children }: ChartFrameProps<Row>) {
  const titleId = useId()
  const tableId = useId()
  const [isTableShown, setIsTableShown] = useState(false)
  return (
    <figure aria-labelledby={titleId} className="grid min-w-0 content-start gap-2">
      <figcaption className="flex flex-wrap items-start justify-between gap-2">
        <div>
          <h3 id={titleId}>{title}</h3>
          {lead !== undefined && <p className="text-slate">{lead}</p>}
        </div>
        <Button
          tone="quiet"
          icon={Table2}
          aria-expanded={isTableShown}
          aria-controls={tableId}
          onClick={() => setIsTableShown(!isTableShown)}
        >
          {isTableShown ? 'Show as chart' : 'Show as table'}
        </Button>
      </figcaption>
      {!isTableShown && (
        <div aria-hidden className="min-w-0">
          {children}
        </div>
      )}
      <div
        id={tableId}
        className={isTableShown ? 'print-whole max-h-96 overflow-auto border-y border-hairline' : 'sr-only'}
      >
        <table aria-labelledby={titleId} className="w-full text-[0.95rem]">
          <thead>
            <tr>
              {columns.map((column) => (
                <th
                  key={column.header}
                  scope="col"
                  className={classNames(
                    'sticky top-0 bg-band px-3 py-1.5',
                    column.align === 'end' ? 'text-right' : 'text-left',
                  )}
                >
                  {column.header}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={rowId(row)}>
                {columns.map((column) => (
                  <td
                    key={column.header}
                    className={classNames(
                      'border-t border-hairline px-3 py-1',
                      column.align === 'end' && 'text-right',
                    )}
                  >
                    {column.cell(row)}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </figure>
  )
}
