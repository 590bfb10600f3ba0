import {
  approveDistribution,
  calculateDistribution,
  getDistribution,
  issueDistribution,
  listDistributions,
  reopenDistribution,
} from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { createDistributionsService } from './distributions.service.ts'

export function createDistributionsRouter(dependencies: Dependencies): Router {
  const service = createDistributionsService(dependencies)
  const router = Router()
  router.use(route(listDistributions, async () => service.list()))
  router.use(route(getDistribution, async ({ actor, params }) => service.view(actor, params.month)))
  router.use(
    route(calculateDistribution, async ({ actor, params }) => service.calculate(actor, params.month)),
  )
  router.use(
    route(approveDistribution, async ({ actor, params, body }) =>
      service.approve(actor, params.month, body.digest),
    ),
  )
  router.use(route(issueDistribution, async ({ actor, params }) => service.issue(actor, params.month)))
  router.use(
    route(reopenDistribution, async ({ actor, params, body }) =>
      service.reopen(actor, params.month, body.reason),
    ),
  )
  return router
}
