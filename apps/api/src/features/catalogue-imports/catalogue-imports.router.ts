import {
  exportCatalogueImportRows,
  getCatalogueImport,
  importCatalogue,
  listCatalogueImportRows,
  listCatalogueImports,
} from '@fieldfare/contracts'
import { Router } from 'express'
import { csvAnswer } from '../../http/csv.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { importRowCsvColumns, presentImport, presentImportRow } from './catalogue-import.presenter.ts'
import { createCatalogueImportsService } from './catalogue-imports.service.ts'

export function createCatalogueImportsRouter(dependencies: Dependencies): Router {
  const imports = createCatalogueImportsService(dependencies)
  const router = Router()
  router.use(
    route(importCatalogue, async ({ actor, scope, file }) =>
      presentImport(await imports.importFile(actor, scope, file)),
    ),
    route(listCatalogueImports, async ({ scope, query }) => {
      const page = await imports.list(scope, query)
      return { ...page, items: page.items.map(presentImport) }
    }),
    route(getCatalogueImport, async ({ scope, params }) =>
      presentImport(await imports.get(scope, params.importId)),
    ),
    route(listCatalogueImportRows, async ({ scope, params, query }) => {
      const page = await imports.listRows(scope, params.importId, query)
      return { ...page, items: page.items.map(presentImportRow) }
    }),
    route(exportCatalogueImportRows, async ({ scope, params, query }) => {
      const { fileName, rows } = await imports.streamRows(scope, params.importId, query.outcome)
      return csvAnswer(importRowCsvColumns, rows, `report-${fileName.replace(/\.csv$/i, '')}.csv`)
    }),
  )
  return router
}
