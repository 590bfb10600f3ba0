import { decideDispute, getDispute, listDisputes, openDispute, replyToDispute } from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { presentDispute } from './dispute.presenter.ts'
import { createDisputesService } from './disputes.service.ts'

export function createDisputesRouter(dependencies: Dependencies): Router {
  const service = createDisputesService(dependencies)
  const router = Router()
  router.use(
    route(listDisputes, async ({ actor, query }) => {
      const page = await service.list(actor, query)
      return { ...page, items: page.items.map(presentDispute) }
    }),
  )
  router.use(route(openDispute, async ({ actor, body }) => service.open(actor, body)))
  router.use(route(getDispute, async ({ actor, params }) => service.view(actor, params.disputeId)))
  router.use(
    route(replyToDispute, async ({ actor, params, body }) =>
      service.reply(actor, params.disputeId, body.text),
    ),
  )
  router.use(
    route(decideDispute, async ({ actor, params, body }) => service.decide(actor, params.disputeId, body)),
  )
  return router
}
