import { disputeStatusLabels, roleLabels, type DisputeSummary } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { MonthFilter } from '../../components/airtime-filters.tsx'
import { LinkButton } from '../../components/button.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { FilterBar, SelectFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatMonth } from '../../lib/format-time.ts'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { disputesQuery } from './disputes-queries.ts'
import { DisputeStatusTag } from './dispute-status-tag.tsx'
import { SocietyTime } from '../../components/society-time.tsx'

const statusChoices = (['open', 'upheld', 'dismissed'] as const).map((value) => ({
  value,
  label: disputeStatusLabels[value],
}))

const columns: readonly DataColumn<DisputeSummary>[] = [
  {
    id: 'number',
    header: 'Dispute',
    sortable: true,
    rowHeader: true,
    cell: (one) => (
      <TextLink to={`/disputes/${one.id}`} aria-label={`Dispute ${one.number}`}>
        <span className="figures">No. {one.number}</span>
      </TextLink>
    ),
  },
  { id: 'status', header: 'State', cell: (one) => <DisputeStatusTag status={one.status} /> },
  {
    id: 'title',
    header: 'Recording',
    sortable: true,
    minWidth: '12rem',
    cell: ({ recording }) => (
      <>
        {recording.title}
        <span className="block text-sm text-slate">{recording.artist}</span>
      </>
    ),
  },
  { id: 'station', header: 'Station', sortable: true, cell: (one) => one.station.name },
  {
    id: 'startedAt',
    header: 'Played',
    cell: (one) => <StationTime instant={one.startedAt} timeZone={one.station.timeZone} precision="second" />,
  },
  { id: 'month', header: 'Month', hiddenAtFirst: true, cell: (one) => formatMonth(one.month) },
  {
    id: 'reason',
    header: 'Reason',
    minWidth: '16rem',
    cell: (one) => <span className="line-clamp-2">{one.reason}</span>,
  },
  {
    id: 'openedAt',
    header: 'Opened',
    sortable: true,
    cell: (one) => (
      <>
        <SocietyTime instant={one.openedAt} precision="day" />
        <span className="block text-sm text-slate">
          {one.openedByName}, {roleLabels[one.openedByRole].toLowerCase()}
        </span>
      </>
    ),
  },
]

export function DisputesPage() {
  const role = useRole()
  const search = useListSearch({ filters: ['status', 'month'], sort: '-openedAt' })
  const disputes = useQuery(disputesQuery(search.query))
  return (
    <>
      <PageHeader
        title="Disputes"
        lead={
          role === 'publisher'
            ? 'The plays you questioned, and what the society answered.'
            : 'Plays that were questioned. A clerk answers and decides, with a reason.'
        }
      />
      <FilterBar search={search}>
        <SelectFilter
          label="State"
          allLabel="Any state"
          choices={statusChoices}
          value={search.filters.status}
          onChange={(value) => search.setFilter('status', value)}
        />
        <MonthFilter value={search.filters.month} onChange={(value) => search.setFilter('month', value)} />
      </FilterBar>
      <DataTable
        name="disputes"
        caption="Disputes"
        captionHidden
        noun="disputes"
        columns={columns}
        query={disputes}
        rowId={(one) => one.id}
        search={search}
        empty={
          <EmptyState
            title="Nothing is disputed"
            action={role !== 'clerk' && <LinkButton to="/plays">Go to the plays</LinkButton>}
          >
            {role === 'clerk'
              ? 'Auditors and publishers dispute plays; each dispute stands here until it is decided.'
              : 'To question a play, open it from the plays or from a statement line and say what is wrong.'}
          </EmptyState>
        }
      />
    </>
  )
}
