import { useQuery } from '@tanstack/react-query'
import { AudioWaveform, Plus } from 'lucide-react'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import { FilterBar, SearchFilter, SelectFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { recordingsQuery } from './catalogue-queries.ts'
import { PartyFilter } from './party-filter.tsx'
import { recordingColumns } from './recordings-columns.tsx'
import { referenceStatusChoices } from './reference-status.tsx'

export function RecordingsPage() {
  const role = useRole()
  const search = useListSearch({ filters: ['search', 'partyId', 'reference'], sort: 'title' })
  const recordings = useQuery(recordingsQuery(search.query))
  return (
    <>
      <PageHeader
        title="Recordings"
        lead={
          role === 'publisher'
            ? 'The recordings in which your parties hold a share, or whose work they share in.'
            : 'Every recording that can be found in the airtime. Each is one ISRC; it is found once its reference audio is fingerprinted.'
        }
        actions={<RecordingsActions role={role} />}
      />
      <FilterBar search={search}>
        <SearchFilter
          label="Search"
          placeholder="Title, artist or ISRC"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
        <PartyFilter
          value={search.filters.partyId}
          onChange={(value) => search.setFilter('partyId', value)}
        />
        <SelectFilter
          label="Reference audio"
          allLabel="Any state"
          choices={referenceStatusChoices}
          value={search.filters.reference}
          onChange={(value) => search.setFilter('reference', value)}
        />
      </FilterBar>
      <DataTable
        name="recordings"
        caption="Recordings"
        captionHidden
        noun="recordings"
        columns={recordingColumns}
        query={recordings}
        rowId={(recording) => recording.id}
        search={search}
        empty={<NoRecordings role={role} />}
      />
    </>
  )
}

function RecordingsActions({ role }: { role: string }) {
  if (role === 'publisher') return null
  return (
    <>
      <LinkButton to="/recordings/reference-audio" icon={AudioWaveform}>
        Reference audio
      </LinkButton>
      {role === 'clerk' && (
        <LinkButton to="/recordings/new" tone="main" icon={Plus}>
          Add a recording
        </LinkButton>
      )}
    </>
  )
}

function NoRecordings({ role }: { role: string }) {
  if (role !== 'clerk') {
    return (
      <EmptyState title="No recordings yet">
        A clerk of the society adds recordings and their shares; they appear here then.
      </EmptyState>
    )
  }
  return (
    <EmptyState
      title="No recordings yet"
      action={
        <>
          <LinkButton to="/imports/new">Import a CSV file</LinkButton>
          <LinkButton to="/recordings/new">Add one by hand</LinkButton>
        </>
      }
    >
      Bring in many at once from a CSV file, or add the first by hand.
    </EmptyState>
  )
}
