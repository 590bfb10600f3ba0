import * as administration from './administration.ts'
import * as auth from './auth.ts'
import * as catalogueImports from './catalogue-imports.ts'
import * as catalogue from './catalogue.ts'
import * as detections from './detections.ts'
import * as disputes from './disputes.ts'
import * as distributions from './distributions.ts'
import * as documentation from './documentation.ts'
import type { Endpoint } from './endpoint.ts'
import * as events from './events.ts'
import * as logs from './logs.ts'
import * as overview from './overview.ts'
import * as plays from './plays.ts'
import * as statements from './statements.ts'
import * as stations from './stations.ts'

const modules = [
  auth,
  stations,
  logs,
  detections,
  plays,
  overview,
  catalogue,
  catalogueImports,
  distributions,
  statements,
  disputes,
  events,
  administration,
  documentation,
]

function isEndpoint(value: unknown): value is Endpoint {
  return (
    typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'access' in value
  )
}

/** Every endpoint of the API: what the documentation lists and the access tests walk. */
export const endpoints: readonly Endpoint[] = modules.flatMap((module) =>
  Object.values<unknown>(module).filter(isEndpoint),
)
