import type { WorkView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { Plus } from 'lucide-react'
import { LinkButton } from '../../components/button.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { Code, Count } from '../../components/figures.tsx'
import { FilterBar, SearchFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { worksQuery } from './catalogue-queries.ts'
import { ClaimedToday } from './claimed-today.tsx'
import { PartyFilter } from './party-filter.tsx'

const columns: readonly DataColumn<WorkView>[] = [
  {
    id: 'title',
    header: 'Title',
    sortable: true,
    rowHeader: true,
    minWidth: '14rem',
    cell: (work) => <TextLink to={`/works/${work.id}`}>{work.title}</TextLink>,
  },
  { id: 'creators', header: 'Creators', cell: (work) => (work.creators === '' ? '–' : work.creators) },
  {
    id: 'iswc',
    header: 'ISWC',
    sortable: true,
    cell: (work) => (work.iswc === null ? '–' : <Code kind="iswc" value={work.iswc} />),
  },
  {
    id: 'recordings',
    header: 'Recordings',
    align: 'end',
    cell: (work) => <Count value={work.recordings.length} />,
  },
  {
    id: 'claimed',
    header: 'Claimed today',
    cell: (work) => <ClaimedToday ppm={work.shares.totalTodayPpm} />,
  },
]

export function WorksPage() {
  const isClerk = useRole() === 'clerk'
  const search = useListSearch({ filters: ['search', 'partyId'], sort: 'title' })
  const works = useQuery(worksQuery(search.query))
  return (
    <>
      <PageHeader
        title="Works"
        lead="The compositions behind the recordings. Money for works goes to those who hold shares here."
        actions={
          isClerk && (
            <LinkButton to="/works/new" tone="main" icon={Plus}>
              Add a work
            </LinkButton>
          )
        }
      />
      <FilterBar search={search}>
        <SearchFilter
          label="Search"
          placeholder="Title, creator or ISWC"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
        <PartyFilter
          value={search.filters.partyId}
          onChange={(value) => search.setFilter('partyId', value)}
        />
      </FilterBar>
      <DataTable
        name="works"
        caption="Works"
        captionHidden
        noun="works"
        columns={columns}
        query={works}
        rowId={(work) => work.id}
        search={search}
        empty={
          <EmptyState
            title="No works yet"
            action={isClerk && <LinkButton to="/works/new">Add the first work</LinkButton>}
          >
            Works come in with a catalogue import or are added one by one.
          </EmptyState>
        }
      />
    </>
  )
}
