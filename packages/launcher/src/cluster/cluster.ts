import { chmod, mkdir, rm } from 'node:fs/promises'

import type { RunningProcess } from '../processes.ts'
import { type Durability, startPostgres } from './postgres.ts'
import { startRedis } from './redis.ts'

export type ClusterOptions = {
  /** Holds both servers' files, passwords, ports and logs. */
  readonly directory: string
  readonly durability: Durability
}

/** A running PostgreSQL and Redis, both on loopback only and behind passwords. */
export type Cluster = {
  /** The address of one database; it need not exist yet. */
  readonly databaseUrl: (database: string) => string
  readonly redisUrl: string
  readonly processes: readonly RunningProcess[]
  /** Ends both servers and keeps their files. */
  readonly stop: () => Promise<void>
  /** Ends both servers and deletes everything under the directory. */
  readonly destroy: () => Promise<void>
}

/**
 * Starts PostgreSQL and Redis, creating them at the first call; ports are chosen once and remembered.
 *
 * @throws LaunchError when the directory is in use or a server does not start
 */
export async function startCluster({ directory, durability }: ClusterOptions): Promise<Cluster> {
  // The user postgres must be able to pass through; every file in it guards itself.
  await mkdir(directory, { recursive: true })
  await chmod(directory, 0o711)
  const postgres = await startPostgres(directory, durability)
  const redis = await startRedis(directory).catch(async (error: unknown) => {
    await postgres.stop()
    throw error
  })
  const stop = async (): Promise<void> => {
    await redis.stop()
    await postgres.stop()
  }
  const destroy = async (): Promise<void> => {
    await stop()
    await rm(postgres.home.directory, { recursive: true, force: true })
    await rm(directory, { recursive: true, force: true })
  }
  return {
    databaseUrl: postgres.urlOf,
    redisUrl: redis.url,
    processes: [postgres.process, redis.process],
    stop,
    destroy,
  }
}
