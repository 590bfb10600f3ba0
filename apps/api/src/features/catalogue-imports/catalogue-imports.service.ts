import type { CatalogueImportId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  type Actor,
  type Database,
  type PageRequest,
  type Scope,
} from '@fieldfare/database'
import { notFound } from '../../http/app-error.ts'
import type { UploadedFile } from '../../http/upload.ts'
import { readCatalogueCsv } from './catalogue-csv.ts'
import {
  findImport,
  listImportRows,
  listImportsInScope,
  streamImportRows,
  type ImportRecord,
} from './catalogue-imports.repository.ts'
import { loadCatalogueState, waitForOtherImports } from './catalogue-state.repository.ts'
import { applyImportPlan, insertImport } from './import-plan.repository.ts'
import { planImport, readRows } from './import-plan.ts'
import type { ReportedRow, RowOutcome } from './row-report.ts'

function summarise(fileName: string, rows: readonly ReportedRow[]): string {
  const counts = (['created', 'updated', 'unchanged', 'refused'] as const).map(
    (outcome) => `${rows.filter((row) => row.outcome === outcome).length} ${outcome}`,
  )
  return `Imported ${fileName}, ${rows.length} rows: ${counts.join(', ')}.`
}

export function createCatalogueImportsService({ database }: { database: Database }) {
  async function demand(scope: Scope, id: CatalogueImportId): Promise<ImportRecord> {
    const found = await findImport(database, scope, id)
    if (found === null) throw notFound('This import')
    return found
  }

  /** The whole file in one transaction, with its report: a crash leaves nothing of it, success all of it. */
  async function importFile(actor: Actor, scope: Scope, file: UploadedFile): Promise<ImportRecord> {
    const csvRows = await readCatalogueCsv(file)
    const id = await inTransaction(database, async (trx) => {
      await waitForOtherImports(trx)
      const { readable, report } = readRows(csvRows)
      const plan = planImport(readable, report, await loadCatalogueState(trx, readable))
      await applyImportPlan(trx, plan)
      const importId = await insertImport(trx, actor, file.originalName, plan.rows)
      await recordAudit(trx, {
        actor,
        action: 'import-catalogue',
        subjectKind: 'catalogue-import',
        subjectId: importId,
        summary: summarise(file.originalName, plan.rows),
      })
      return importId
    })
    return demand(scope, id)
  }

  return {
    importFile,
    get: demand,
    list: (scope: Scope, page: PageRequest) => listImportsInScope(database, scope, page),
    async listRows(
      scope: Scope,
      id: CatalogueImportId,
      filter: PageRequest & { outcome?: RowOutcome | undefined },
    ) {
      await demand(scope, id)
      return listImportRows(database, id, filter)
    },
    async streamRows(scope: Scope, id: CatalogueImportId, outcome: RowOutcome | undefined) {
      const found = await demand(scope, id)
      return { fileName: found.fileName, rows: streamImportRows(database, id, outcome) }
    },
  }
}
