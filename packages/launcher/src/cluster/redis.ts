import { mkdir, writeFile } from 'node:fs/promises'
import { join } from 'node:path'

import { Redis } from 'ioredis'

import { LaunchError } from '../launch-error.ts'
import { readLogTail, type RunningProcess, startProcess } from '../processes.ts'
import { waitUntil } from '../wait-until.ts'
import { keepPort } from './kept-port.ts'
import { keepSecret } from './secrets.ts'

export type RedisServer = {
  readonly process: RunningProcess
  readonly url: string
  readonly stop: () => Promise<void>
}

const GRACE_MS = 10_000

/** One for each test file that asks, so that parallel tests never meet; Redis itself allows any number. */
export const REDIS_DATABASE_COUNT = 512

/** Starts Redis under `directory`. It keeps nothing on disk: PostgreSQL holds every job. */
export async function startRedis(directory: string): Promise<RedisServer> {
  const home = join(directory, 'redis')
  await mkdir(home, { recursive: true, mode: 0o700 })
  const password = await keepSecret(join(directory, 'redis-password'))
  const port = await keepPort(join(directory, 'redis-port'))
  const configurationFile = join(home, 'redis.conf')
  const configuration = [
    ...['bind 127.0.0.1', `port ${port}`, `requirepass ${password}`, `dir "${home}"`, 'daemonize no'],
    ...['save ""', 'appendonly no', 'maxmemory-policy noeviction', `databases ${REDIS_DATABASE_COUNT}`],
  ]
  await writeFile(configurationFile, `${configuration.join('\n')}\n`, { mode: 0o600 })
  const server = await startProcess({
    name: 'Redis',
    command: 'redis-server',
    commandArguments: [configurationFile],
    directory: home,
    environment: { PATH: process.env['PATH'], LC_ALL: 'C.UTF-8' },
    logFile: join(directory, 'redis.log'),
  })
  const url = `redis://:${password}@127.0.0.1:${port}/0`
  const stop = (): Promise<void> => server.stop('SIGTERM', GRACE_MS)
  await waitForServer(server, url).catch(async (error: unknown) => {
    await stop()
    throw error
  })
  return { process: server, url, stop }
}

async function waitForServer(server: RunningProcess, url: string): Promise<void> {
  await waitUntil(
    async () => {
      if (server.hasExited()) {
        throw new LaunchError(`Redis did not start:\n${await readLogTail(server.logFile)}`)
      }
      return answersPing(url)
    },
    { everyMs: 50, timeoutMs: 30_000, description: 'Redis to answer' },
  )
}

async function answersPing(url: string): Promise<boolean> {
  const client = new Redis(url, { lazyConnect: true, retryStrategy: () => null, maxRetriesPerRequest: 0 })
  // Without a listener a refused connection would be printed; the promise below already tells.
  client.on('error', () => undefined)
  try {
    await client.connect()
    await client.ping()
    return true
  } catch {
    // Still starting; waitForServer gives up in time and shows the log.
    return false
  } finally {
    client.disconnect()
  }
}
