import { availableParallelism } from 'node:os'

import type { DataDirectory } from './data-directory.ts'

export type ServiceEnvironmentOptions = {
  readonly data: DataDirectory
  readonly databaseUrl: string
  readonly redisUrl: string
  readonly apiPort: number
  readonly tokenSecret: string
  readonly webDirectory: string
  /** The launcher's own environment: what a person set there wins over the defaults. */
  readonly given: NodeJS.ProcessEnv
}

/** The environment of API, worker and demo seed. */
export function buildServiceEnvironment(options: ServiceEnvironmentOptions): NodeJS.ProcessEnv {
  const { data } = options
  const defaults = {
    FIELDFARE_MODE: 'development',
    FIELDFARE_PUBLIC_URL: `http://127.0.0.1:${options.apiPort}`,
    FIELDFARE_TOKEN_SECRET: options.tokenSecret,
    FIELDFARE_STORAGE: 'disk',
    FIELDFARE_STORAGE_DIR: data.storage,
    FIELDFARE_CACHE_DIR: data.cache,
    FIELDFARE_MAIL: 'inbox',
    FIELDFARE_WORKER_THREADS: String(availableParallelism()),
  }
  // What the launcher runs itself cannot be set from outside.
  const owned = {
    FIELDFARE_DATABASE_URL: options.databaseUrl,
    FIELDFARE_REDIS_URL: options.redisUrl,
    FIELDFARE_API_PORT: String(options.apiPort),
    FIELDFARE_WEB_DIR: options.webDirectory,
    FIELDFARE_DATA_DIR: data.root,
  }
  return { ...defaults, ...options.given, ...owned }
}
