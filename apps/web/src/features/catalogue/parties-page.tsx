import type { PartyView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { Plus } from 'lucide-react'
import { LinkButton } from '../../components/button.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { Count } from '../../components/figures.tsx'
import { FilterBar, SearchFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { partiesQuery } from './catalogue-queries.ts'
import { IpiWithCheck } from './ipi-with-check.tsx'

const columns: readonly DataColumn<PartyView>[] = [
  {
    id: 'name',
    header: 'Name',
    sortable: true,
    rowHeader: true,
    minWidth: '14rem',
    cell: (party) => <TextLink to={`/parties/${party.id}`}>{party.name}</TextLink>,
  },
  { id: 'ipi', header: 'IPI', sortable: true, cell: (party) => <IpiWithCheck party={party} /> },
  { id: 'works', header: 'Works', align: 'end', cell: (party) => <Count value={party.works} /> },
  {
    id: 'recordings',
    header: 'Recordings',
    align: 'end',
    cell: (party) => <Count value={party.recordings} />,
  },
]

export function PartiesPage() {
  const isClerk = useRole() === 'clerk'
  const search = useListSearch({ filters: ['search'], sort: 'name' })
  const parties = useQuery(partiesQuery(search.query))
  return (
    <>
      <PageHeader
        title="Parties"
        lead="Interested parties: those who hold shares and are paid."
        actions={
          isClerk && (
            <LinkButton to="/parties/new" tone="main" icon={Plus}>
              Add a party
            </LinkButton>
          )
        }
      />
      <FilterBar search={search}>
        <SearchFilter
          label="Search"
          placeholder="Name or IPI"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
      </FilterBar>
      <DataTable
        name="parties"
        caption="Interested parties"
        captionHidden
        noun="parties"
        columns={columns}
        query={parties}
        rowId={(party) => party.id}
        search={search}
        empty={
          <EmptyState
            title="No parties yet"
            action={isClerk && <LinkButton to="/parties/new">Add the first party</LinkButton>}
          >
            Parties come in with a catalogue import or are added one by one.
          </EmptyState>
        }
      />
    </>
  )
}
