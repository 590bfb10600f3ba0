import {
  getSystemHealth,
  getUser,
  inviteUser,
  listAuditEvents,
  listInbox,
  listUsers,
  updateUser,
} from '@fieldfare/contracts'
import { listAuditEvents as readAuditEvents, listMail, listUsers as readUsers } from '@fieldfare/database'
import { Router } from 'express'
import { AppError } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import * as invitations from './invitations.service.ts'
import { describeSystem } from './system.service.ts'
import { presentUser } from './user.presenter.ts'
import * as users from './users.service.ts'

export function createAdministrationRouter(dependencies: Dependencies): Router {
  const { database, configuration } = dependencies
  const router = Router()
  router.use(
    route(listUsers, async ({ query }) => {
      const page = await readUsers(database, query)
      return { ...page, items: page.items.map(presentUser) }
    }),
  )
  router.use(
    route(inviteUser, async ({ actor, body }) =>
      presentUser(await invitations.inviteUser(dependencies, actor, body)),
    ),
  )
  router.use(
    route(getUser, async ({ params }) => presentUser(await users.getUser(dependencies, params.userId))),
  )
  router.use(
    route(updateUser, async ({ actor, params, body }) =>
      presentUser(await users.updateUser(dependencies, actor, params.userId, body)),
    ),
  )
  router.use(
    route(listInbox, async ({ query }) => {
      if (configuration.mail.kind !== 'inbox') {
        throw new AppError('not-found', { detail: 'Mail is sent for real here, so there is no local inbox.' })
      }
      return listMail(database, query)
    }),
  )
  router.use(route(getSystemHealth, async () => describeSystem(dependencies)))
  router.use(route(listAuditEvents, async ({ query }) => readAuditEvents(database, query)))
  return router
}
