import type { EndpointOutput, listAuditEvents } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { FilterBar, SearchFilter, SelectFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { SocietyTime } from '../../components/society-time.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { auditEventsQuery } from './administration-queries.ts'
import { subjectChoices, subjectLabel, subjectPath } from './audit-subjects.ts'

type AuditEvent = EndpointOutput<typeof listAuditEvents>['items'][number]

const columns: readonly DataColumn<AuditEvent>[] = [
  {
    id: 'at',
    header: 'When',
    rowHeader: true,
    cell: (event) => <SocietyTime instant={event.at} precision="second" />,
  },
  { id: 'actor', header: 'Who', minWidth: '9rem', cell: (event) => event.actorName },
  {
    id: 'summary',
    header: 'What was done',
    minWidth: '20rem',
    cell: (event) => <span className="break-words">{event.summary}</span>,
  },
  { id: 'subject', header: 'To what', cell: (event) => <Subject event={event} /> },
  {
    id: 'action',
    header: 'Action',
    hiddenAtFirst: true,
    cell: (event) => <span className="figures">{event.action}</span>,
  },
]

function Subject({ event: { subjectKind, subjectId } }: { event: AuditEvent }) {
  const path = subjectPath({ kind: subjectKind, id: subjectId }, useRole())
  const label = subjectLabel(subjectKind)
  return path === null ? label : <TextLink to={path}>{label}</TextLink>
}

export function AuditTrailPage() {
  const search = useListSearch({ filters: ['search', 'subjectKind', 'subjectId'] })
  const events = useQuery(auditEventsQuery(search.query))
  return (
    <>
      <PageHeader
        title="Audit trail"
        lead="Who did what and when, newest first. Nothing here can be changed or taken out."
      />
      <FilterBar search={search}>
        <SearchFilter
          label="Search"
          placeholder="Person or words"
          value={search.filters.search}
          onChange={(value) => search.setFilter('search', value)}
        />
        <SelectFilter
          label="To what"
          allLabel="Everything"
          choices={subjectChoices}
          value={search.filters.subjectKind}
          onChange={(value) => search.setFilter('subjectKind', value)}
        />
      </FilterBar>
      <DataTable
        name="audit-trail"
        caption="Audit trail"
        captionHidden
        noun="entries"
        columns={columns}
        query={events}
        rowId={(event) => event.id}
        search={search}
        empty={
          <EmptyState title="Nothing has been done yet">
            Every change is written here with its author.
          </EmptyState>
        }
      />
    </>
  )
}
