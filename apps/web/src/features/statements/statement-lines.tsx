import { rightLabels, type StatementLine, type StatementView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { Code, Count, Duration, Percent } from '../../components/figures.tsx'
import { FilterBar, SearchFilter, SelectFilter } from '../../components/filters.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { StatementMoney } from './statement-money.tsx'
import { statementLinesQuery } from './statements-queries.ts'

type Owner = Pick<StatementView, 'id' | 'currency' | 'currencyDigits'>

const rightChoices = [
  { value: 'works', label: rightLabels.works },
  { value: 'recordings', label: rightLabels.recordings },
]

function lineColumns({ id, currency, currencyDigits }: Owner): readonly DataColumn<StatementLine>[] {
  return [
    {
      id: 'lineNumber',
      header: 'Line',
      sortable: true,
      rowHeader: true,
      align: 'end',
      cell: (line) => (
        <TextLink
          to={`/statements/${id}/lines/${line.lineNumber}`}
          aria-label={`Line ${line.lineNumber}, its plays`}
        >
          <span className="figures">{line.lineNumber}</span>
        </TextLink>
      ),
    },
    {
      id: 'title',
      header: 'Title',
      sortable: true,
      minWidth: '12rem',
      cell: (line) => (
        <>
          {line.title}
          <span className="block text-sm text-slate">{line.artist}</span>
        </>
      ),
    },
    { id: 'right', header: 'Right', cell: (line) => rightLabels[line.right] },
    { id: 'code', header: 'ISRC or ISWC', hiddenAtFirst: true, cell: lineCode },
    { id: 'station', header: 'Station', cell: (line) => line.station.name },
    {
      id: 'plays',
      header: 'Plays',
      sortable: true,
      align: 'end',
      cell: (line) => <Count value={line.plays} />,
    },
    {
      id: 'creditedSeconds',
      header: 'Credited time',
      sortable: true,
      align: 'end',
      cell: (line) => <Duration seconds={line.creditedSeconds} />,
    },
    {
      id: 'share',
      header: 'Share',
      align: 'end',
      cell: (line) => <Percent ppm={line.sharePpm} decimals={4} />,
    },
    {
      id: 'amountMinor',
      header: 'Amount',
      sortable: true,
      align: 'end',
      cell: (line) => (
        <StatementMoney amountMinor={line.amountMinor} currency={currency} currencyDigits={currencyDigits} />
      ),
    },
  ]
}

function lineCode({ code, right }: StatementLine) {
  if (code === null) return '–'
  return <Code kind={right === 'works' && code.startsWith('T') ? 'iswc' : 'isrc'} value={code} />
}

/** The lines of a statement; each leads to its plays. */
export function StatementLines({ statement }: { statement: Owner }) {
  const { id, currency, currencyDigits } = statement
  const columns = useMemo(() => lineColumns({ id, currency, currencyDigits }), [id, currency, currencyDigits])
  const search = useListSearch({ filters: ['search', 'right'], sort: 'lineNumber' })
  const lines = useQuery(statementLinesQuery(id, search.query))
  return (
    <>
      <FilterBar search={search}>
        <SearchFilter
          label="Search"
          placeholder="Title or artist"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
        <SelectFilter
          label="Right"
          allLabel="Both rights"
          choices={rightChoices}
          value={search.filters.right}
          onChange={(value) => search.setFilter('right', value)}
        />
      </FilterBar>
      <DataTable
        name="statement-lines"
        caption="Statement lines"
        captionHidden
        noun="lines"
        columns={columns}
        query={lines}
        rowId={(line) => String(line.lineNumber)}
        search={search}
        empty={<EmptyState title="No lines">Nothing was attributed to this payee in this month.</EmptyState>}
      />
    </>
  )
}
