import { streamEvents } from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { mayHear } from './events.policy.ts'

/** Live progress: the hub hands on what workers publish and ends the stream with the session. */
export function createEventsRouter({ events }: Dependencies): Router {
  const router = Router()
  router.use(
    route(streamEvents, async ({ actor, sessionId, scope }) => (stream) => {
      events.attach({
        stream,
        sessionId,
        scope,
        isVisible: (event, scopeNow) => mayHear(actor.role, scopeNow, event),
      })
    }),
  )
  return router
}
