import { logStatusLabels, logStatusSchema, uploadLog } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { Upload } from 'lucide-react'
import { MonthFilter, StationFilter } from '../../components/airtime-filters.tsx'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import { FilterBar, SelectFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { useLiveLogs } from './live-logs.ts'
import { logColumns } from './logs-columns.tsx'
import { logsQuery } from './logs-queries.ts'

const statusChoices = logStatusSchema.options.map((status) => ({
  value: status,
  label: logStatusLabels[status],
}))

export function LogsPage() {
  const role = useRole()
  const maySend = uploadLog.access.some((sender) => sender === role)
  const search = useListSearch({ filters: ['stationId', 'month', 'status'], sort: '-startedAt' })
  const logs = useQuery(logsQuery(search.query))
  useLiveLogs()
  const send = (
    <LinkButton to="/logs/new" tone="main" icon={Upload}>
      Send station logs
    </LinkButton>
  )
  return (
    <>
      <PageHeader
        title="Station logs"
        lead="Recordings of what was broadcast, how far each is analysed, and what to do about those that could not be used."
        actions={maySend && send}
      />
      <FilterBar search={search}>
        <StationFilter
          value={search.filters.stationId}
          onChange={(value) => search.setFilter('stationId', value)}
        />
        <MonthFilter value={search.filters.month} onChange={(value) => search.setFilter('month', value)} />
        <SelectFilter
          label="State"
          allLabel="Any state"
          value={search.filters.status}
          onChange={(value) => search.setFilter('status', value)}
          choices={statusChoices}
        />
      </FilterBar>
      <DataTable
        name="logs"
        caption="Station logs"
        captionHidden
        noun="station logs"
        columns={logColumns}
        query={logs}
        rowId={(log) => log.id}
        search={search}
        empty={
          <EmptyState title="No station logs yet" action={maySend && send}>
            {maySend
              ? 'Send the recordings of what your station broadcast. Each is analysed as soon as it has arrived.'
              : 'Logs appear here once a station has sent the recordings of what it broadcast.'}
          </EmptyState>
        }
      />
    </>
  )
}
