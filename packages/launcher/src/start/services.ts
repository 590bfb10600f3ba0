import { join } from 'node:path'
import { setTimeout as pause } from 'node:timers/promises'

import { LaunchError } from '../launch-error.ts'
import { type Exit, readLogTail, type RunningProcess, startProcess } from '../processes.ts'
import { waitUntil } from '../wait-until.ts'

export type ServicesOptions = {
  /** Root of the checkout. */
  readonly repository: string
  readonly environment: NodeJS.ProcessEnv
  readonly logDirectory: string
  readonly signal: AbortSignal
  readonly log: (line: string) => void
}

export type Services = {
  /** Rejects when the API ends without having been asked to. */
  readonly failure: Promise<never>
  /** Ends the worker, then the API. */
  readonly stop: () => Promise<void>
}

const API_READY_MS = 60_000
const API_GRACE_MS = 10_000
const WORKER_GRACE_MS = 30_000
const FIRST_DELAY_MS = 1_000
const LONGEST_DELAY_MS = 30_000
/** A worker that ran this long was well, so its next restart is quick again. */
const WELL_MS = 60_000

/** Starts the API and waits until it is ready, then keeps a worker running. */
export async function startServices(options: ServicesOptions): Promise<Services> {
  const api = await startService(options, 'API', 'apps/api/src/main.ts', 'api.log')
  try {
    await waitForApi(options, api)
  } catch (error) {
    await api.stop('SIGTERM', API_GRACE_MS)
    throw error
  }
  const stopping = new AbortController()
  const worker = await keepWorker(options, stopping.signal)
  const failure = api.exited.then(async (exit): Promise<never> => {
    if (stopping.signal.aborted) return new Promise<never>(() => undefined)
    throw new LaunchError(await describeDeath(api, exit))
  })
  // Whoever stops before the failure comes up must not be told of it as unhandled.
  failure.catch(() => undefined)
  const stop = async (): Promise<void> => {
    stopping.abort()
    await worker.stop()
    await api.stop('SIGTERM', API_GRACE_MS)
  }
  return { failure, stop }
}

function startService(
  { repository, environment, logDirectory }: ServicesOptions,
  name: string,
  entry: string,
  logName: string,
): Promise<RunningProcess> {
  return startProcess({
    name,
    command: process.execPath,
    commandArguments: ['--enable-source-maps', '--import', 'tsx', entry],
    directory: repository,
    environment,
    logFile: join(logDirectory, logName),
  })
}

async function waitForApi({ environment, signal }: ServicesOptions, api: RunningProcess): Promise<void> {
  const url = `http://127.0.0.1:${environment['FIELDFARE_API_PORT'] ?? ''}/api/health/ready`
  await waitUntil(
    async () => {
      signal.throwIfAborted()
      if (api.hasExited()) throw new LaunchError(await describeDeath(api, await api.exited))
      return isReady(url)
    },
    { everyMs: 100, timeoutMs: API_READY_MS, description: `the API to be ready (its log: ${api.logFile})` },
  )
}

async function isReady(url: string): Promise<boolean> {
  try {
    const answer = await fetch(url, { signal: AbortSignal.timeout(5_000) })
    await answer.body?.cancel()
    return answer.status < 500
  } catch {
    // Not listening yet; waitForApi gives up in time and names the log.
    return false
  }
}

async function keepWorker(
  options: ServicesOptions,
  stopping: AbortSignal,
): Promise<{ readonly stop: () => Promise<void> }> {
  const start = (): Promise<RunningProcess> =>
    startService(options, 'worker', 'packages/worker/src/main.ts', 'worker.log')
  let worker = await start()
  // A function, since the answer changes during every wait below.
  const isStopping = (): boolean => stopping.aborted
  const supervise = async (): Promise<void> => {
    let delayMs = FIRST_DELAY_MS
    while (!isStopping()) {
      const startedAt = performance.now()
      const exit = await worker.exited
      if (isStopping()) return
      if (performance.now() - startedAt > WELL_MS) delayMs = FIRST_DELAY_MS
      options.log(`${await describeDeath(worker, exit)}\nStarting the worker again in ${delayMs / 1000} s.`)
      await pause(delayMs, undefined, { signal: stopping }).catch(() => undefined)
      if (isStopping()) return
      delayMs = Math.min(delayMs * 2, LONGEST_DELAY_MS)
      worker = await start()
    }
  }
  const supervision = supervise()
  const stop = async (): Promise<void> => {
    await worker.stop('SIGTERM', WORKER_GRACE_MS)
    await supervision
    // The supervision may have been starting the next one just when the stop began.
    await worker.stop('SIGTERM', WORKER_GRACE_MS)
  }
  return { stop }
}

async function describeDeath({ name, logFile }: RunningProcess, { code, signal }: Exit): Promise<string> {
  const how = signal === null ? `with code ${code ?? 'unknown'}` : `by ${signal}`
  return `The ${name} ended ${how}. The last lines of ${logFile}:\n${await readLogTail(logFile)}`
}
