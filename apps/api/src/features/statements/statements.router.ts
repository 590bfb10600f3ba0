import {
  getStatement,
  getStatementCsv,
  getStatementPdf,
  listStatementLinePlays,
  listStatementLines,
  listStatements,
} from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { presentPlay } from '../../records/play-view.ts'
import { presentStatement, presentStatementLine, presentStatementView } from './statement.presenter.ts'
import { createStatementsService } from './statements.service.ts'

export function createStatementsRouter(dependencies: Dependencies): Router {
  const service = createStatementsService(dependencies)
  const router = Router()
  router.use(
    route(listStatements, async ({ scope, query }) => {
      const page = await service.list(scope, query)
      return { ...page, items: page.items.map(presentStatement) }
    }),
  )
  router.use(
    route(getStatement, async ({ scope, params }) => {
      const { statement, parts } = await service.read(scope, params.statementId)
      return presentStatementView(statement, parts)
    }),
  )
  router.use(
    route(listStatementLines, async ({ scope, params, query }) => {
      const page = await service.lines(scope, params.statementId, query)
      return { ...page, items: page.items.map(presentStatementLine) }
    }),
  )
  router.use(
    route(listStatementLinePlays, async ({ scope, params, query, actor }) => {
      const page = await service.playsOfLine(scope, params.statementId, params.lineNumber, query)
      return { ...page, items: page.items.map((play) => presentPlay(play, actor)) }
    }),
  )
  router.use(
    route(getStatementPdf, async ({ scope, params }) => service.file(scope, params.statementId, 'pdf')),
  )
  router.use(
    route(getStatementCsv, async ({ scope, params }) => service.file(scope, params.statementId, 'csv')),
  )
  return router
}
