import { exportPlays, type PlayStatus, type Role } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useSearchParams } from 'react-router'
import { MonthFilter, StationFilter } from '../../components/airtime-filters.tsx'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import { FilterBar, SearchFilter, SelectFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { downloadAddress } from '../../lib/endpoint-address.ts'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { DisputedPlay } from './disputed-play.tsx'
import { DISPUTE_PARAMETER, playColumnsFor } from './plays-columns.tsx'
import { playsQuery } from './plays-queries.ts'

const leads = {
  uploader:
    'What was found in the logs of your stations. Each play leads to the stretch of log it was heard in.',
  clerk: 'What earns money: each play leads to the evidence it rests on.',
  publisher:
    'Where and when music in which your parties hold a share was played. Question any play you find wrong.',
  auditor: 'What earns money: each play leads to the evidence it rests on and can be disputed.',
  admin: 'What earns money.',
} as const satisfies Record<Role, string>

const statusChoices = [
  { value: 'counted', label: 'Counted' },
  { value: 'removed', label: 'Removed' },
] as const satisfies readonly { value: PlayStatus; label: string }[]

export function PlaysPage() {
  const role = useRole()
  const [address, setAddress] = useSearchParams()
  const search = useListSearch({
    filters: ['search', 'stationId', 'recordingId', 'partyId', 'month', 'day', 'status'],
    sort: '-startedAt',
  })
  const plays = useQuery(playsQuery(search.query))
  const disputedId = address.get(DISPUTE_PARAMETER)
  const disputed = plays.data?.items.find((play) => play.id === disputedId && play.canDispute)
  const closeDispute = () =>
    setAddress(
      (current) => {
        const next = new URLSearchParams(current)
        next.delete(DISPUTE_PARAMETER)
        return next
      },
      { replace: true, preventScrollReset: true },
    )
  return (
    <>
      <PageHeader title="Plays" lead={leads[role]} />
      {disputed !== undefined && <DisputedPlay key={disputed.id} play={disputed} onCancel={closeDispute} />}
      <FilterBar search={search}>
        <SearchFilter
          label="Title, artist or ISRC"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
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
        name={`plays-${role}`}
        caption="Plays"
        captionHidden
        noun="plays"
        columns={playColumnsFor(role)}
        query={plays}
        rowId={(play) => play.id}
        search={search}
        exportHref={downloadAddress(exportPlays, { query: search.exportQuery })}
        empty={<NoPlays role={role} />}
      />
    </>
  )
}

function NoPlays({ role }: { role: Role }) {
  if (role === 'publisher') {
    return (
      <EmptyState
        title="No plays of your music yet"
        action={<LinkButton to="/recordings">See your recordings</LinkButton>}
      >
        Plays appear here once a station’s log was analysed and one of your recordings was found in it. A
        recording needs reference audio to be found.
      </EmptyState>
    )
  }
  return (
    <EmptyState title="No plays yet" action={<LinkButton to="/logs">See the station logs</LinkButton>}>
      Plays appear here once a station log was analysed and a recording was found in it.
    </EmptyState>
  )
}
