import type { DistributionSummary } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { LinkButton } from '../../components/button.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { Count } from '../../components/figures.tsx'
import { Money } from '../../components/money.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatMonth } from '../../lib/format-time.ts'
import { useServerEvents } from '../../lib/server-events.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { distributionsQuery } from './distributions-queries.ts'
import { MonthStatusTag } from './month-status-tag.tsx'
import { SocietyTime } from '../../components/society-time.tsx'

function amountCell(amount: string | null, currency: string) {
  if (amount === null) return <span className="text-slate">Not calculated</span>
  return <Money amountMinor={amount} currency={currency} />
}

const columns: readonly DataColumn<DistributionSummary>[] = [
  {
    id: 'month',
    header: 'Month',
    rowHeader: true,
    minWidth: '10rem',
    cell: (one) => <TextLink to={`/distributions/${one.month}`}>{formatMonth(one.month)}</TextLink>,
  },
  { id: 'status', header: 'State', cell: (one) => <MonthStatusTag status={one.status} /> },
  { id: 'plays', header: 'Plays', align: 'end', cell: (one) => <Count value={one.plays} /> },
  { id: 'fee', header: 'Fees', align: 'end', cell: (one) => amountCell(one.feeMinor, one.currency) },
  { id: 'net', header: 'Net', align: 'end', cell: (one) => amountCell(one.netMinor, one.currency) },
  {
    id: 'allocated',
    header: 'To payees',
    align: 'end',
    cell: (one) => amountCell(one.allocatedMinor, one.currency),
  },
  {
    id: 'heldBack',
    header: 'Held back',
    align: 'end',
    cell: (one) => amountCell(one.heldBackMinor, one.currency),
  },
  { id: 'payees', header: 'Payees', align: 'end', cell: (one) => <Count value={one.payees} /> },
  {
    id: 'calculated',
    header: 'Calculated by',
    hiddenAtFirst: true,
    cell: (one) => one.calculatedByName ?? '–',
  },
  {
    id: 'approved',
    header: 'Approved by',
    hiddenAtFirst: true,
    cell: (one) => one.approvedByName ?? '–',
  },
  {
    id: 'issued',
    header: 'Issued',
    cell: (one) => (one.issuedAt === null ? '–' : <SocietyTime instant={one.issuedAt} precision="day" />),
  },
]

export function DistributionsPage() {
  const distributions = useQuery(distributionsQuery())
  useServerEvents((event, queryClient) => {
    if (event.kind === 'distribution-progress') void refreshScopes(queryClient, 'distributions')
  })
  return (
    <>
      <PageHeader
        title="Distributions"
        lead="Each month’s licence fees, divided among those whose music was played. A month is calculated by one clerk, approved by another, then issued for good."
      />
      <DataTable
        name="distributions"
        caption="Months, newest first"
        captionHidden
        noun="months"
        columns={columns}
        query={distributions}
        rowId={(one) => one.month}
        empty={
          <EmptyState
            title="No month to distribute yet"
            action={<LinkButton to="/logs">Go to the station logs</LinkButton>}
          >
            A month appears here once a station log of it is held.
          </EmptyState>
        }
      />
    </>
  )
}
