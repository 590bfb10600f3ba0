import type { CatalogueImportView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { FileInput } from 'lucide-react'
import { LinkButton } from '../../components/button.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { DataTable } from '../../components/data-table.tsx'
import { Count } from '../../components/figures.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { SocietyTime } from '../../components/society-time.tsx'
import { importsQuery } from './imports-queries.ts'
import { RefusedCount } from './refused-count.tsx'

const columns: readonly DataColumn<CatalogueImportView>[] = [
  {
    id: 'fileName',
    header: 'File',
    rowHeader: true,
    minWidth: '14rem',
    cell: (one) => <TextLink to={`/imports/${one.id}`}>{one.fileName}</TextLink>,
  },
  { id: 'importedAt', header: 'Imported', cell: (one) => <SocietyTime instant={one.importedAt} /> },
  { id: 'importedBy', header: 'By', cell: (one) => one.importedByName },
  { id: 'rows', header: 'Rows', align: 'end', cell: (one) => <Count value={one.rows} /> },
  { id: 'created', header: 'Created', align: 'end', cell: (one) => <Count value={one.created} /> },
  { id: 'updated', header: 'Updated', align: 'end', cell: (one) => <Count value={one.updated} /> },
  { id: 'unchanged', header: 'Unchanged', align: 'end', cell: (one) => <Count value={one.unchanged} /> },
  { id: 'refused', header: 'Refused', align: 'end', cell: (one) => <RefusedCount value={one.refused} /> },
  { id: 'warnings', header: 'Warnings', align: 'end', cell: (one) => <Count value={one.warnings} /> },
]

export function ImportsPage() {
  const isClerk = useRole() === 'clerk'
  const search = useListSearch({ filters: [] })
  const imports = useQuery(importsQuery(search.query))
  const start = (
    <LinkButton to="/imports/new" tone="main" icon={FileInput}>
      Import a CSV file
    </LinkButton>
  )
  return (
    <>
      <PageHeader
        title="Imports"
        lead="Catalogue files that were brought in, each with a report of what became of every row."
        actions={isClerk && start}
      />
      <DataTable
        name="imports"
        caption="Catalogue imports, newest first"
        captionHidden
        noun="imports"
        columns={columns}
        query={imports}
        rowId={(one) => one.id}
        search={search}
        empty={
          <EmptyState title="Nothing imported yet">
            A clerk brings recordings, works, parties and shares in from one CSV file.
          </EmptyState>
        }
      />
    </>
  )
}
