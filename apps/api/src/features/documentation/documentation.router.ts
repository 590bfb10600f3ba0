import { join } from 'node:path'
import { buildOpenApiDocument, getDocumentationPage, getOpenApi } from '@fieldfare/contracts'
import { Router, type Request, type Response } from 'express'
import { textFile } from '../../http/file-answer.ts'
import { route } from '../../http/route.ts'
import { renderDocumentationPage } from './documentation-page.ts'

/** A file beside the page: the content policy allows no style within it. */
const STYLESHEET = '/api/documentation/style.css'

export function createDocumentationRouter(): Router {
  const document = buildOpenApiDocument()
  const page = renderDocumentationPage(document, STYLESHEET)
  const router = Router()
  router.use(route(getOpenApi, async () => document))
  router.use(
    route(getDocumentationPage, async () =>
      textFile({
        mediaType: 'text/html; charset=utf-8',
        fileName: 'fieldfare-interface.html',
        text: page,
        disposition: 'inline',
      }),
    ),
  )
  router.get(STYLESHEET, (_request: Request, response: Response) => {
    response.sendFile('documentation.css', { root: join(import.meta.dirname), maxAge: '1h' })
  })
  return router
}
