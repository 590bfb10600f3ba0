import type { EndpointResult, getCatalogueImport, listCatalogueImportRows } from '@fieldfare/contracts'
import type { CsvColumn } from '../../http/csv.ts'
import type { ImportRecord } from './catalogue-imports.repository.ts'
import type { ReportedRow } from './row-report.ts'

export function presentImport(found: ImportRecord): EndpointResult<typeof getCatalogueImport> {
  return {
    id: found.id,
    fileName: found.fileName,
    importedByName: found.importedByName,
    importedAt: found.importedAt,
    rows: found.rows,
    created: found.created,
    updated: found.updated,
    unchanged: found.unchanged,
    refused: found.refused,
    warnings: found.warnings,
  }
}

export function presentImportRow(
  row: ReportedRow,
): EndpointResult<typeof listCatalogueImportRows>['items'][number] {
  return { line: row.line, isrc: row.isrc, title: row.title, outcome: row.outcome, messages: row.messages }
}

export const importRowCsvColumns: readonly CsvColumn<ReportedRow>[] = [
  { header: 'Line', value: ({ line }) => line },
  { header: 'ISRC', value: ({ isrc }) => isrc },
  { header: 'Title', value: ({ title }) => title },
  { header: 'Outcome', value: ({ outcome }) => outcome },
  { header: 'Messages', value: ({ messages }) => messages.join(' ') },
]
