import { analyseLogAgain, getLog, listLogs as listLogsEndpoint, uploadLog } from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { receiveLog } from './log-upload.service.ts'
import { presentLog } from './log.presenter.ts'
import { analyseAgain, listLogs, readLog, readLogSpans } from './logs.service.ts'

export function createLogsRouter(dependencies: Dependencies): Router {
  const router = Router()
  router.use(
    route(uploadLog, async ({ actor, scope, params, body, file }) => {
      const id = await receiveLog(dependencies, {
        actor,
        scope,
        stationId: params.stationId,
        upload: body,
        file,
      })
      return presentLog(await readLog(dependencies, scope, id), actor)
    }),
    route(listLogsEndpoint, async ({ actor, scope, query }) => {
      const page = await listLogs(dependencies, scope, query)
      return { ...page, items: page.items.map((item) => presentLog(item, actor)) }
    }),
    route(getLog, async ({ actor, scope, params }) => {
      const found = await readLog(dependencies, scope, params.logId)
      return { log: presentLog(found, actor), spans: await readLogSpans(dependencies, found.log) }
    }),
    route(analyseLogAgain, async ({ actor, scope, params }) => {
      await analyseAgain(dependencies, actor, params.logId)
      return presentLog(await readLog(dependencies, scope, params.logId), actor)
    }),
  )
  return router
}
