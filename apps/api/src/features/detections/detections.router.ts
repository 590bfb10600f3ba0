import {
  exportDetections,
  getDetection,
  getDetectionClip,
  listDetections,
  reviewDetection,
} from '@fieldfare/contracts'
import { Router } from 'express'
import { csvAnswer } from '../../http/csv.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { presentDetection } from './detection.presenter.ts'
import { detectionCsvColumns } from './detections.csv.ts'
import { createDetectionsService } from './detections.service.ts'

export function createDetectionsRouter(dependencies: Dependencies): Router {
  const service = createDetectionsService(dependencies)
  const router = Router()

  router.use(
    route(listDetections, async ({ scope, query, actor }) => {
      const page = await service.list(scope, query)
      return { ...page, items: page.items.map((detection) => presentDetection(detection, actor)) }
    }),
  )
  router.use(
    route(exportDetections, async ({ scope, query }) =>
      csvAnswer(detectionCsvColumns, service.stream(scope, query), 'detections.csv'),
    ),
  )
  router.use(route(getDetection, async ({ actor, params }) => service.detail(actor, params.detectionId)))
  router.use(
    route(getDetectionClip, async ({ scope, params, query, meta }) =>
      service.clip(scope, { ...params, fromSeconds: query.fromSeconds }, meta.signal),
    ),
  )
  router.use(
    route(reviewDetection, async ({ actor, params, body }) =>
      service.review(actor, params.detectionId, body),
    ),
  )
  return router
}
