import { createServer, type Server } from 'node:http'
import { type AddressInfo } from 'node:net'
import { createDatabase, createStorage, type Configuration } from '@fieldfare/database'
import { Redis } from 'ioredis'
import { pino, type Logger } from 'pino'
import { buildApp } from './build-app.ts'
import type { Dependencies } from './http/dependencies.ts'
import { describeError } from './http/describe-error.ts'
import { createEventHub } from './http/event-hub.ts'

/** Requests under way get this long to end before their connections are cut; it must be under the launcher's 10 s. */
const GRACE_MS = 8000

export type RunningApi = {
  /** Where it listens; tests ask for port 0. */
  url: string
  dependencies: Dependencies
  /** Finishes what is under way, then closes everything that was opened. */
  close: () => Promise<void>
}

export function createApiLogger(configuration: Configuration): Logger {
  return pino({
    level: configuration.logLevel,
    base: { service: 'api' },
    serializers: { err: describeError },
    redact: {
      paths: [
        '*.password',
        '*.passwordHash',
        '*.token',
        '*.email',
        'headers.cookie',
        'headers.authorization',
      ],
      censor: '[removed]',
    },
  })
}

function listen(server: Server, configuration: Configuration): Promise<AddressInfo> {
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen(configuration.apiPort, configuration.apiHost, () => {
      const address = server.address()
      if (address === null || typeof address === 'string') reject(new Error('The server listens on no port'))
      else resolve(address)
    })
  })
}

function closeServer(server: Server): Promise<void> {
  return new Promise((resolve) => {
    const cut = setTimeout(() => server.closeAllConnections(), GRACE_MS)
    server.close(() => {
      clearTimeout(cut)
      resolve()
    })
    server.closeIdleConnections()
  })
}

/** Opens database, Redis and storage, builds the application and listens. */
export async function startApi(
  configuration: Configuration,
  options: { logger?: Logger; clock?: () => Date } = {},
): Promise<RunningApi> {
  const logger = options.logger ?? createApiLogger(configuration)
  const database = createDatabase({
    databaseUrl: configuration.databaseUrl,
    applicationName: 'fieldfare-api',
  })
  const redis = new Redis(configuration.redisUrl, { maxRetriesPerRequest: 1 })
  redis.on('error', (error) => logger.warn({ err: error }, 'Redis cannot be reached'))
  const storage = createStorage(configuration.storage)
  const events = createEventHub({ database, redis, logger })
  const dependencies: Dependencies = {
    database,
    redis,
    storage,
    configuration,
    logger,
    clock: options.clock ?? (() => new Date()),
    events,
  }
  const server = createServer(buildApp(dependencies))
  // Uploads of many gigabytes over slow lines take longer than Node's five minutes for a whole request.
  server.requestTimeout = 0
  const address = await listen(server, configuration)
  events.start().catch((error: unknown) => logger.error({ err: error }, 'live progress cannot be followed'))
  return {
    url: `http://${configuration.apiHost}:${address.port}`,
    dependencies,
    async close() {
      await events.stop()
      await closeServer(server)
      redis.disconnect()
      storage.close()
      await database.destroy()
    },
  }
}
