import type { ReactNode } from 'react'
import { ScrollRegion } from '../../components/scroll-region.tsx'

type PlainTableProps = {
  caption: string
  head: readonly string[]
  rows: readonly { key: string; cells: readonly ReactNode[] }[]
  /** Columns from this one on hold figures and stand to the right. */
  figureFrom?: number
}

/** A short table that comes whole and needs no paging. */
export function PlainTable({ caption, head, rows, figureFrom = head.length }: PlainTableProps) {
  const side = (index: number) => (index >= figureFrom ? 'px-3 py-1.5 text-right' : 'px-3 py-1.5 text-left')
  return (
    <ScrollRegion label={caption}>
      <table className="w-full text-[0.95rem]">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-b border-ink">
            {head.map((header, index) => (
              <th key={header} scope="col" className={side(index)}>
                {header}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map(({ key, cells }) => (
            <tr key={key} className="border-b border-hairline align-top">
              {cells.map((cell, index) =>
                index === 0 ? (
                  <th key={head[index]} scope="row" className="px-3 py-1.5 text-left font-normal">
                    {cell}
                  </th>
                ) : (
                  <td key={head[index]} className={side(index)}>
                    {cell}
                  </td>
                ),
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </ScrollRegion>
  )
}
