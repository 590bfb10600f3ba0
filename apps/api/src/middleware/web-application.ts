import { join, resolve } from 'node:path'
import express, { Router, type NextFunction, type Request, type Response } from 'express'

/**
 * Serves the built web application. Built files carry a hash in their name, so browsers may keep them for ever;
 * the page that names them is asked for each time. Unknown paths get that page, since the browser routes them.
 */
export function serveWebApplication(directory: string): Router {
  const root = resolve(directory)
  const router = Router()
  router.use(
    '/assets',
    express.static(join(root, 'assets'), { immutable: true, maxAge: '1y', index: false, fallthrough: false }),
  )
  router.use(express.static(root, { index: false, maxAge: '1h', redirect: false }))
  router.use((request: Request, response: Response, next: NextFunction) => {
    const wantsPage = request.method === 'GET' || request.method === 'HEAD'
    if (!wantsPage || request.accepts('html') === false) {
      next()
      return
    }
    response.setHeader('cache-control', 'no-cache')
    response.sendFile('index.html', { root, cacheControl: false }, (error) => {
      if (error !== undefined && !response.headersSent) next(error)
    })
  })
  return router
}
