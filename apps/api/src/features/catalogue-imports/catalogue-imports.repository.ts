import type { CatalogueImportId, Instant } from '@fieldfare/contracts'
import {
  fetchPage,
  type Connection,
  type Database,
  type PageRequest,
  type PageResult,
  type Scope,
} from '@fieldfare/database'
import { streamRows } from '../../records/stream-rows.repository.ts'
import type { ReportedRow, RowOutcome } from './row-report.ts'

export type ImportRecord = {
  id: CatalogueImportId
  fileName: string
  importedByName: string
  importedAt: Instant
  rows: number
  created: number
  updated: number
  unchanged: number
  refused: number
  warnings: number
}

const counted = (name: string, condition: string) =>
  `(select count(*)::int from catalogue_import_rows where import_id = catalogue_imports.id ${condition}) as ${name}`

/** Imports are the desk's own: whoever sees only some stations or parties sees none of them. */
function selectImports(connection: Connection, scope: Scope) {
  const query = connection('catalogue_imports')
    .join('users', 'users.id', 'catalogue_imports.imported_by')
    .select<ImportRecord[]>(
      {
        id: 'catalogue_imports.id',
        fileName: 'catalogue_imports.file_name',
        importedByName: 'users.name',
        importedAt: 'catalogue_imports.imported_at',
      },
      connection.raw(counted('rows', '')),
      connection.raw(counted('created', "and outcome = 'created'")),
      connection.raw(counted('updated', "and outcome = 'updated'")),
      connection.raw(counted('unchanged', "and outcome = 'unchanged'")),
      connection.raw(counted('refused', "and outcome = 'refused'")),
      connection.raw(counted('warnings', "and outcome <> 'refused' and cardinality(messages) > 0")),
    )
  if (scope.kind !== 'all') query.whereRaw('false')
  return query
}

export async function listImportsInScope(
  database: Database,
  scope: Scope,
  page: PageRequest,
): Promise<PageResult<ImportRecord>> {
  const query = selectImports(database, scope).orderBy([
    { column: 'catalogue_imports.imported_at', order: 'desc' },
    { column: 'catalogue_imports.id' },
  ])
  return fetchPage<ImportRecord>(database, query, page)
}

export async function findImport(
  connection: Connection,
  scope: Scope,
  id: CatalogueImportId,
): Promise<ImportRecord | null> {
  const row: ImportRecord | undefined = await selectImports(connection, scope)
    .where('catalogue_imports.id', id)
    .first()
  return row ?? null
}

function selectRows(database: Database, id: CatalogueImportId, outcome: RowOutcome | undefined) {
  const query = database('catalogue_import_rows')
    .where({ import_id: id })
    .orderBy('line')
    .select<ReportedRow[]>('line', 'isrc', 'title', 'outcome', 'messages')
  return outcome === undefined ? query : query.andWhere({ outcome })
}

/** The report of an import that the caller has found in scope. */
export async function listImportRows(
  database: Database,
  id: CatalogueImportId,
  filter: PageRequest & { outcome?: RowOutcome | undefined },
): Promise<PageResult<ReportedRow>> {
  return fetchPage<ReportedRow>(database, selectRows(database, id, filter.outcome), filter)
}

export function streamImportRows(
  database: Database,
  id: CatalogueImportId,
  outcome: RowOutcome | undefined,
): AsyncGenerator<ReportedRow> {
  return streamRows<ReportedRow>(database, selectRows(database, id, outcome))
}
