import cookieParser from 'cookie-parser'
import express, { type Express, type Router } from 'express'
import { createAdministrationRouter } from './features/administration/administration.router.ts'
import { createAuthRouter } from './features/auth/auth.router.ts'
import { createCatalogueImportsRouter } from './features/catalogue-imports/catalogue-imports.router.ts'
import { createCatalogueRouter } from './features/catalogue/catalogue.router.ts'
import { createDocumentationRouter } from './features/documentation/documentation.router.ts'
import { createHealthRouter } from './features/health/health.router.ts'
import { createDetectionsRouter } from './features/detections/detections.router.ts'
import { createPlaysRouter } from './features/plays/plays.router.ts'
import { createOverviewRouter } from './features/overview/overview.router.ts'
import { createDistributionsRouter } from './features/distributions/distributions.router.ts'
import { createLogsRouter } from './features/logs/logs.router.ts'
import { createReferenceAudioRouter } from './features/reference-audio/reference-audio.router.ts'
import { createStationsRouter } from './features/stations/stations.router.ts'
import { createStatementsRouter } from './features/statements/statements.router.ts'
import { createEventsRouter } from './features/events/events.router.ts'
import { createDisputesRouter } from './features/disputes/disputes.router.ts'
import type { Dependencies } from './http/dependencies.ts'
import { requestContext } from './http/request-context.ts'
import { provideContext } from './middleware/context.ts'
import { refuseUnknownAddress } from './middleware/no-such-address.ts'
import { answerProblem } from './middleware/problem.ts'
import { requestLog } from './middleware/request-log.ts'
import { securityHeaders } from './middleware/security-headers.ts'
import { serveWebApplication } from './middleware/web-application.ts'

/** Every feature of the API; a new one is added here and nowhere else. */
const features: readonly ((dependencies: Dependencies) => Router)[] = [
  createHealthRouter,
  createDocumentationRouter,
  createAuthRouter,
  createAdministrationRouter,
  createStationsRouter,
  createCatalogueRouter,
  createCatalogueImportsRouter,
  createReferenceAudioRouter,
  createLogsRouter,
  createDetectionsRouter,
  createPlaysRouter,
  createOverviewRouter,
  createDistributionsRouter,
  createStatementsRouter,
  createEventsRouter,
  createDisputesRouter,
]

/** Puts the application together. It neither listens nor connects: `server.ts` does. */
export function buildApp(dependencies: Dependencies): Express {
  const { configuration, logger } = dependencies
  const app = express()
  app.disable('x-powered-by')
  app.disable('etag')
  // Only a proxy on this machine may tell whose request it passes on.
  app.set('trust proxy', 'loopback')
  app.use(securityHeaders(configuration.publicUrl))
  app.use(provideContext(dependencies))
  app.use(requestLog(logger, (request) => requestContext(request).correlationId))
  app.use(cookieParser())
  for (const createFeature of features) app.use(createFeature(dependencies))
  app.use('/api', refuseUnknownAddress)
  if (configuration.webDirectory !== null) app.use(serveWebApplication(configuration.webDirectory))
  app.use(refuseUnknownAddress)
  app.use(answerProblem)
  return app
}
