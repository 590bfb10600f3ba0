import type { RouteObject } from 'react-router'
import { accountRoutes } from '../features/account/routes.tsx'
import { catalogueRoutes } from '../features/catalogue/routes.tsx'
import { detectionsRoutes } from '../features/detections/routes.tsx'
import { importsRoutes } from '../features/imports/routes.tsx'
import { logsRoutes } from '../features/logs/routes.tsx'
import { overviewRoutes } from '../features/overview/routes.tsx'
import { playsRoutes } from '../features/plays/routes.tsx'
import { stationsRoutes } from '../features/stations/routes.tsx'
import { distributionsRoutes } from '../features/distributions/routes.tsx'
import { statementsRoutes } from '../features/statements/routes.tsx'
import { disputesRoutes } from '../features/disputes/routes.tsx'
import { administrationRoutes } from '../features/administration/routes.tsx'

/** The start page of those whose work begins with the month. */
export const homeRoutes: RouteObject[] = [...overviewRoutes]

/** Pages inside the shell. A new feature adds its routes here; see features/account/routes.tsx for the form. */
export const shellRoutes: RouteObject[] = [
  ...accountRoutes,
  ...stationsRoutes,
  ...logsRoutes,
  ...detectionsRoutes,
  ...playsRoutes,
  ...catalogueRoutes,
  ...importsRoutes,
  ...distributionsRoutes,
  ...statementsRoutes,
  ...disputesRoutes,
  ...administrationRoutes,
]
