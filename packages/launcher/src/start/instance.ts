import { join } from 'node:path'

import { type Cluster, startCluster } from '../cluster/cluster.ts'
import { dropDatabase, ensureDatabase } from '../cluster/databases.ts'
import { keepSecret } from '../cluster/secrets.ts'
import { LaunchError } from '../launch-error.ts'
import { acquireLock, type Lock, LockHeldError } from '../lock.ts'
import { migrate } from '../migrate.ts'
import { findFreePortFrom } from '../ports.ts'
import { readLogTail } from '../processes.ts'
import { buildWeb } from '../web-build.ts'
import { announce } from './announcement.ts'
import { type DataDirectory, prepareDataDirectory } from './data-directory.ts'
import { forgetDemo, readDemoSignIns, readDemoState, seedDemoOnce, type SeedOptions } from './demo.ts'
import type { StartOptions } from './options.ts'
import { buildServiceEnvironment } from './service-environment.ts'
import { startServices } from './services.ts'

export type InstanceOptions = StartOptions & {
  /** Root of the checkout. */
  readonly repository: string
  readonly signal: AbortSignal
  readonly log: (line: string) => void
}

const DATABASE = 'fieldfare'

/** Wrapped, because a promise returned by itself would be waited for. */
type Running = { readonly failure: Promise<never> }

type Undo = { readonly what: string; readonly run: () => Promise<void> }

/**
 * Runs one instance from start to stop: returns when it was asked to stop and everything has ended.
 *
 * @throws {@link LaunchError} when a part cannot start or fails; all others have been ended by then
 */
export async function runInstance(options: InstanceOptions): Promise<void> {
  const undo: Undo[] = []
  try {
    const { failure } = await startAll(options, undo)
    await Promise.race([failure, untilAborted(options.signal)])
  } catch (error) {
    if (!options.signal.aborted) throw error
  } finally {
    if (options.signal.aborted) options.log('\nStopping …')
    for (const { what, run } of undo.reverse()) {
      await run().catch((error: unknown) => options.log(`${what} did not stop cleanly: ${String(error)}`))
    }
    if (options.signal.aborted) options.log('Stopped.')
  }
}

async function startAll(options: InstanceOptions, undo: Undo[]): Promise<Running> {
  const startedAt = performance.now()
  const { repository, signal, log } = options
  const data = await prepareDataDirectory(options.dataDirectory)
  const lock = await takeLock(data)
  undo.push({ what: 'The lock', run: lock.release })

  log('Starting PostgreSQL and Redis')
  const cluster = await startCluster({ directory: data.cluster, durability: 'durable' })
  undo.push({ what: 'PostgreSQL or Redis', run: cluster.stop })
  signal.throwIfAborted()
  const demoState = await prepareDatabase(options, cluster, data)

  const webDirectory = join(repository, 'dist/web')
  await buildWeb({
    repository,
    outputDirectory: webDirectory,
    signal,
    onBuild: () => log('Building the web application'),
  })

  const apiPort = await findFreePortFrom(options.preferredPort)
  const environment = buildServiceEnvironment({
    data,
    databaseUrl: cluster.databaseUrl(DATABASE),
    redisUrl: cluster.redisUrl,
    apiPort,
    tokenSecret: await keepSecret(data.tokenSecretFile),
    webDirectory,
    given: process.env,
  })
  log('Starting the API and the worker')
  const services = await startServices({ repository, environment, logDirectory: data.logs, signal, log })
  undo.push({ what: 'The API or the worker', run: services.stop })
  const failure = Promise.race([services.failure, failureOf(cluster, signal)])
  // It is awaited below and by the caller; in between it must not count as unhandled.
  failure.catch(() => undefined)

  if (options.withDemo && demoState !== 'ready') {
    await seedWhileServicesLive({ ...options, data, environment }, failure)
  }
  const address = environment['FIELDFARE_PUBLIC_URL'] ?? `http://127.0.0.1:${apiPort}`
  const signIns = await readDemoSignIns(data)
  const elapsedMs = performance.now() - startedAt
  log(announce({ address, dataDirectory: data.root, logDirectory: data.logs, signIns, elapsedMs }))
  return { failure }
}

async function seedWhileServicesLive(
  options: Omit<InstanceOptions, 'dataDirectory'> & Pick<SeedOptions, 'data' | 'environment'>,
  failure: Promise<never>,
): Promise<void> {
  const { log } = options
  log('Preparing the demonstration: the first start only, a few minutes')
  const ending = new AbortController()
  const signal = AbortSignal.any([options.signal, ending.signal])
  try {
    await Promise.race([failure, seedDemoOnce({ ...options, signal, log: (line) => log(`  ${line}`) })])
  } finally {
    // Without the API there is nothing to seed through.
    ending.abort()
  }
}

async function takeLock(data: DataDirectory): Promise<Lock> {
  try {
    return await acquireLock(data.lockFile)
  } catch (error) {
    if (!(error instanceof LockHeldError)) throw error
    throw new LaunchError(
      `Fieldfare already runs with ${data.root} (process ${error.pid}). Stop it first, or give another --data-dir.`,
    )
  }
}

async function prepareDatabase(
  { repository, log }: InstanceOptions,
  cluster: Cluster,
  data: DataDirectory,
): Promise<'absent' | 'ready'> {
  const state = await readDemoState(data)
  if (state === 'unfinished') {
    log('The last start was interrupted while it prepared the demonstration: beginning anew')
    await dropDatabase(cluster, DATABASE)
    await forgetDemo(data)
    await prepareDataDirectory(data.root)
  }
  await ensureDatabase(cluster, DATABASE)
  const names = await migrate(cluster.databaseUrl(DATABASE), join(repository, 'migrations'))
  if (names.length > 0) log(`Brought the database up to date (${names.length} migrations)`)
  return state === 'ready' ? 'ready' : 'absent'
}

/** Rejects when PostgreSQL or Redis ends while it is still needed. */
async function failureOf(cluster: Cluster, signal: AbortSignal): Promise<never> {
  const endings = cluster.processes.map(async (server) => {
    await server.exited
    return server
  })
  const first = await Promise.race(endings)
  if (signal.aborted) return new Promise<never>(() => undefined)
  throw new LaunchError(`${first.name} ended. Its last lines:\n${await readLogTail(first.logFile)}`)
}

function untilAborted(signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    if (signal.aborted) resolve()
    else signal.addEventListener('abort', () => resolve(), { once: true })
  })
}
