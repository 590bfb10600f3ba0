import { listReferenceAudio, retryReferenceAudio, uploadReferenceAudio } from '@fieldfare/contracts'
import { Router } from 'express'
import type { Dependencies } from '../../http/dependencies.ts'
import { route } from '../../http/route.ts'
import { presentReferenceAudio } from './reference-audio.presenter.ts'
import { createReferenceAudioService } from './reference-audio.service.ts'

export function createReferenceAudioRouter(dependencies: Dependencies): Router {
  const referenceAudio = createReferenceAudioService(dependencies)
  const router = Router()
  router.use(
    route(uploadReferenceAudio, async ({ actor, scope, file, body }) =>
      presentReferenceAudio(await referenceAudio.upload(actor, scope, file, body.recordingId)),
    ),
    route(listReferenceAudio, async ({ scope, query }) => {
      const page = await referenceAudio.list(scope, query)
      return { ...page, items: page.items.map(presentReferenceAudio) }
    }),
    route(retryReferenceAudio, async ({ actor, scope, params }) =>
      presentReferenceAudio(await referenceAudio.retry(actor, scope, params.referenceAudioId)),
    ),
  )
  return router
}
