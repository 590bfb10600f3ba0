import { getMonthOverview, listMonths } from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { createOverviewService } from './overview.service.ts'

export function createOverviewRouter(dependencies: Dependencies): Router {
  const service = createOverviewService(dependencies)
  const router = Router()
  router.use(route(listMonths, async ({ scope }) => service.months(scope)))
  router.use(route(getMonthOverview, async ({ scope, params }) => service.overview(scope, params.month)))
  return router
}
