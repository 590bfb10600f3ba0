import { exportPlays, getRecordingPlays, listPlays } from '@fieldfare/contracts'
import { Router } from 'express'
import { csvAnswer } from '../../http/csv.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { presentPlay } from '../../records/play-view.ts'
import { playCsvColumns } from './plays.csv.ts'
import { createPlaysService } from './plays.service.ts'

export function createPlaysRouter({ database }: Dependencies): Router {
  const service = createPlaysService(database)
  const router = Router()

  router.use(
    route(listPlays, async ({ scope, query, actor }) => {
      const page = await service.list(scope, query)
      return { ...page, items: page.items.map((play) => presentPlay(play, actor)) }
    }),
  )
  router.use(
    route(exportPlays, async ({ scope, query }) =>
      csvAnswer(playCsvColumns, service.stream(scope, query), 'plays.csv'),
    ),
  )
  router.use(
    route(getRecordingPlays, async ({ scope, params }) =>
      service.countOfRecording(scope, params.recordingId),
    ),
  )
  return router
}
