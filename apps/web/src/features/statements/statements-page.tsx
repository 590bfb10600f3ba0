import type { StatementSummary } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { MonthFilter } from '../../components/airtime-filters.tsx'
import { LinkButton } from '../../components/button.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { FilterBar, SearchFilter } from '../../components/filters.tsx'
import { Money } from '../../components/money.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatMonth } from '../../lib/format-time.ts'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { StatementFiles } from './statement-files.tsx'
import { StatementStatusTag } from './statement-status.tsx'
import { statementsQuery } from './statements-queries.ts'

const columns: readonly DataColumn<StatementSummary>[] = [
  {
    id: 'number',
    header: 'Statement',
    sortable: true,
    rowHeader: true,
    cell: (one) => (
      <TextLink to={`/statements/${one.id}`}>
        <span className="figures">{one.number}</span>
      </TextLink>
    ),
  },
  { id: 'month', header: 'Month', sortable: true, cell: (one) => formatMonth(one.month) },
  { id: 'party', header: 'Party', sortable: true, minWidth: '12rem', cell: (one) => one.party.name },
  {
    id: 'netMinor',
    header: 'Amount',
    sortable: true,
    align: 'end',
    cell: (one) => (
      <Money amountMinor={one.netMinor} currency={one.currency} currencyDigits={one.currencyDigits} signed />
    ),
  },
  { id: 'status', header: 'State', cell: (one) => <StatementStatusTag status={one.status} /> },
  { id: 'files', header: 'Download', cell: (one) => <StatementFiles statement={one} /> },
]

export function StatementsPage() {
  const role = useRole()
  const search = useListSearch({ filters: ['search', 'month', 'partyId'], sort: '-month' })
  const statements = useQuery(statementsQuery(search.query))
  return (
    <>
      <PageHeader
        title="Statements"
        lead={
          role === 'publisher'
            ? 'What your parties earned, month by month. Every line leads to its plays and every play to its sound.'
            : 'What each payee is due, month by month. Drafts are seen by the desk only, until the month is issued.'
        }
      />
      <FilterBar search={search}>
        <SearchFilter
          label="Search"
          placeholder="Party or statement number"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
        <MonthFilter value={search.filters.month} onChange={(value) => search.setFilter('month', value)} />
      </FilterBar>
      <DataTable
        name="statements"
        caption="Statements"
        captionHidden
        noun="statements"
        columns={columns}
        query={statements}
        rowId={(one) => one.id}
        search={search}
        empty={<NoStatements isPublisher={role === 'publisher'} />}
      />
    </>
  )
}

function NoStatements({ isPublisher }: { isPublisher: boolean }) {
  if (isPublisher) {
    return (
      <EmptyState title="No statement yet" action={<LinkButton to="/plays">See your plays</LinkButton>}>
        The society issues statements once a month is approved. You get an e-mail then, and the statement
        stands here.
      </EmptyState>
    )
  }
  return (
    <EmptyState
      title="No statement yet"
      action={<LinkButton to="/distributions">Go to the distributions</LinkButton>}
    >
      Statements are made when a month is calculated, and issued after a second person approved it.
    </EmptyState>
  )
}
