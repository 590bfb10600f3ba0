import {
  createLicence,
  createStation,
  getStation,
  getStationDay,
  getStationMonth,
  listStations,
  updateLicence,
  updateStation,
} from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { createLicencesService } from './licences.service.ts'
import { createStationAirtimeService } from './station-airtime.service.ts'
import { presentStation } from './station.presenter.ts'
import { createStationsService } from './stations.service.ts'

export function createStationsRouter(dependencies: Dependencies): Router {
  const stations = createStationsService(dependencies)
  const licences = createLicencesService(dependencies)
  const airtime = createStationAirtimeService(dependencies)
  const router = Router()
  router.use(
    route(listStations, async ({ actor, scope }) => {
      const items = await stations.list(scope)
      return { items: items.map((station) => presentStation(station, actor)) }
    }),
    route(getStation, async ({ actor, scope, params }) =>
      presentStation(await stations.get(scope, params.stationId), actor),
    ),
    route(createStation, async ({ actor, body }) =>
      presentStation(await stations.create(actor, body), actor),
    ),
    route(updateStation, async ({ actor, params, body }) =>
      presentStation(await stations.update(actor, params.stationId, body), actor),
    ),
    route(createLicence, async ({ actor, params, body }) =>
      presentStation(await licences.add(actor, params.stationId, body), actor),
    ),
    route(updateLicence, async ({ actor, params, body }) =>
      presentStation(await licences.change(actor, params.licenceId, body), actor),
    ),
    route(getStationDay, async ({ scope, params }) => airtime.readDay(scope, params.stationId, params.day)),
    route(getStationMonth, async ({ scope, params }) =>
      airtime.readMonth(scope, params.stationId, params.month),
    ),
  )
  return router
}
