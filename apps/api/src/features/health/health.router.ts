import { getLiveness, getReadiness } from '@fieldfare/contracts'
import { pingDatabase } from '@fieldfare/database'
import { Router } from 'express'
import { AppError } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'

/** For those who run the process: is it there, and can it work? */
export function createHealthRouter({ database, redis }: Dependencies): Router {
  const router = Router()
  router.use(route(getLiveness, async () => ({ status: 'alive' as const })))
  router.use(
    route(getReadiness, async () => {
      try {
        await Promise.all([pingDatabase(database), redis.ping()])
      } catch (error) {
        throw new AppError('unavailable', {
          detail: 'Database or queue cannot be reached at present.',
          cause: error,
        })
      }
      return { status: 'ready' as const }
    }),
  )
  return router
}
