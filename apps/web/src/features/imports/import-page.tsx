import {
  exportCatalogueImportRows,
  type CatalogueImportView,
  type EndpointOutput,
  type listCatalogueImportRows,
} from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useParams } from 'react-router'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { KeyFigures } from '../../components/definition-list.tsx'
import { Count } from '../../components/figures.tsx'
import { FilterBar, SelectFilter } from '../../components/filters.tsx'
import { Notice } from '../../components/notice.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { downloadAddress } from '../../lib/endpoint-address.ts'
import { useListSearch } from '../../lib/list-search.ts'
import { SocietyTime } from '../../components/society-time.tsx'
import { importQuery, importRowsQuery } from './imports-queries.ts'
import { outcomeChoices, OutcomeTag } from './outcome-tag.tsx'
import { RefusedCount } from './refused-count.tsx'

type ImportRow = EndpointOutput<typeof listCatalogueImportRows>['items'][number]

const columns: readonly DataColumn<ImportRow>[] = [
  {
    id: 'line',
    header: 'Line',
    rowHeader: true,
    align: 'end',
    cell: (row) => <Count value={row.line} />,
  },
  { id: 'outcome', header: 'Outcome', cell: (row) => <OutcomeTag outcome={row.outcome} /> },
  {
    id: 'messages',
    header: 'Why, and what to look at',
    minWidth: '18rem',
    cell: (row) => <Messages messages={row.messages} />,
  },
  // As it stood in the file: a refused row may hold anything.
  { id: 'isrc', header: 'ISRC in the file', cell: (row) => <span className="figures">{row.isrc}</span> },
  { id: 'title', header: 'Title', minWidth: '12rem', cell: (row) => row.title },
]

function Messages({ messages }: { messages: readonly string[] }) {
  if (messages.length === 0) return <span className="text-slate">Nothing to say</span>
  return (
    <ul>
      {messages.map((message) => (
        <li key={message}>{message}</li>
      ))}
    </ul>
  )
}

export function ImportPage() {
  const { importId = '' } = useParams()
  const one = useQuery(importQuery(importId))
  return (
    <QueryState query={one} loading="Fetching the import">
      {(data) => <ImportReport data={data} />}
    </QueryState>
  )
}

function ImportReport({ data }: { data: CatalogueImportView }) {
  return (
    <>
      <PageHeader
        title={data.fileName}
        breadcrumbs={[{ label: 'Imports', to: '/imports' }]}
        lead={
          <>
            Imported by {data.importedByName}, <SocietyTime instant={data.importedAt} />.
          </>
        }
      />
      <div className="grid gap-4">
        <KeyFigures
          items={[
            { label: 'Rows', value: <Count value={data.rows} /> },
            { label: 'Created', value: <Count value={data.created} /> },
            { label: 'Updated', value: <Count value={data.updated} /> },
            { label: 'Unchanged', value: <Count value={data.unchanged} /> },
            { label: 'Refused', value: <RefusedCount value={data.refused} /> },
            { label: 'Warnings', value: <Count value={data.warnings} /> },
          ]}
        />
        {data.refused > 0 && (
          <Notice tone="warn" title="Some rows were refused">
            Nothing of a refused row was written. Mend these rows in the file and import it again: what went
            in already stays as it is.
          </Notice>
        )}
      </div>
      <Section title="Row by row">
        <RowReport importId={data.id} />
      </Section>
    </>
  )
}

function RowReport({ importId }: { importId: string }) {
  const search = useListSearch({ filters: ['outcome'] })
  const rows = useQuery(importRowsQuery(importId, search.query))
  return (
    <>
      <FilterBar search={search}>
        <SelectFilter
          label="Outcome"
          allLabel="All rows"
          choices={outcomeChoices}
          value={search.filters.outcome}
          onChange={(value) => search.setFilter('outcome', value)}
        />
      </FilterBar>
      <DataTable
        name="import-rows"
        caption="Report of the import"
        captionHidden
        noun="rows"
        columns={columns}
        query={rows}
        rowId={(row) => String(row.line)}
        search={search}
        exportHref={downloadAddress(exportCatalogueImportRows, {
          params: { importId },
          query: { outcome: search.filters.outcome },
        })}
        empty={<EmptyState title="The file had no rows">Only its line of column names was there.</EmptyState>}
      />
    </>
  )
}
