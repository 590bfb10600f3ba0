import {
  createParty,
  createRecording,
  createWork,
  getParty,
  getRecording,
  getWork,
  listParties,
  listRecordings,
  listWorks,
  setRecordingShares,
  setWorkShares,
  updateParty,
  updateRecording,
  updateWork,
} from '@fieldfare/contracts'
import { readSociety, type Actor } from '@fieldfare/database'
import { Router } from 'express'
import { localDayOf } from '../../airtime/local-time.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { presentParty, presentRecording, presentWork, type Viewer } from './catalogue.presenter.ts'
import { createPartiesService } from './parties.service.ts'
import { createRecordingsService } from './recordings.service.ts'
import { createWorksService } from './works.service.ts'

type ViewerOf = (actor: Actor) => Promise<Viewer>

function partyRoutes(dependencies: Dependencies, viewerOf: ViewerOf): Router[] {
  const parties = createPartiesService(dependencies)
  return [
    route(listParties, async ({ actor, scope, query }) => {
      const viewer = await viewerOf(actor)
      const page = await parties.list(scope, query)
      return { ...page, items: page.items.map((party) => presentParty(party, viewer)) }
    }),
    route(getParty, async ({ actor, scope, params }) =>
      presentParty(await parties.get(scope, params.partyId), await viewerOf(actor)),
    ),
    route(createParty, async ({ actor, body }) =>
      presentParty(await parties.create(actor, body), await viewerOf(actor)),
    ),
    route(updateParty, async ({ actor, params, body }) =>
      presentParty(await parties.update(actor, params.partyId, body), await viewerOf(actor)),
    ),
  ]
}

function workRoutes(dependencies: Dependencies, viewerOf: ViewerOf): Router[] {
  const works = createWorksService(dependencies)
  return [
    route(listWorks, async ({ actor, scope, query }) => {
      const viewer = await viewerOf(actor)
      const page = await works.list(scope, query)
      return { ...page, items: page.items.map((work) => presentWork(work, viewer)) }
    }),
    route(getWork, async ({ actor, scope, params }) =>
      presentWork(await works.get(scope, params.workId), await viewerOf(actor)),
    ),
    route(createWork, async ({ actor, body }) =>
      presentWork(await works.create(actor, body), await viewerOf(actor)),
    ),
    route(updateWork, async ({ actor, params, body }) =>
      presentWork(await works.update(actor, params.workId, body), await viewerOf(actor)),
    ),
    route(setWorkShares, async ({ actor, params, body }) =>
      presentWork(await works.replaceShares(actor, params.workId, body), await viewerOf(actor)),
    ),
  ]
}

function recordingRoutes(dependencies: Dependencies, viewerOf: ViewerOf): Router[] {
  const recordings = createRecordingsService(dependencies)
  return [
    route(listRecordings, async ({ actor, scope, query }) => {
      const viewer = await viewerOf(actor)
      const page = await recordings.list(scope, query)
      return { ...page, items: page.items.map((recording) => presentRecording(recording, viewer)) }
    }),
    route(getRecording, async ({ actor, scope, params }) =>
      presentRecording(await recordings.get(scope, params.recordingId), await viewerOf(actor)),
    ),
    route(createRecording, async ({ actor, body }) =>
      presentRecording(await recordings.create(actor, body), await viewerOf(actor)),
    ),
    route(updateRecording, async ({ actor, params, body }) =>
      presentRecording(await recordings.update(actor, params.recordingId, body), await viewerOf(actor)),
    ),
    route(setRecordingShares, async ({ actor, params, body }) =>
      presentRecording(
        await recordings.replaceShares(actor, params.recordingId, body),
        await viewerOf(actor),
      ),
    ),
  ]
}

export function createCatalogueRouter(dependencies: Dependencies): Router {
  const viewerOf: ViewerOf = async (actor) => {
    const { timeZone } = await readSociety(dependencies.database)
    return { actor, today: localDayOf(dependencies.clock(), timeZone) }
  }
  const router = Router()
  router.use(
    ...partyRoutes(dependencies, viewerOf),
    ...workRoutes(dependencies, viewerOf),
    ...recordingRoutes(dependencies, viewerOf),
  )
  return router
}
