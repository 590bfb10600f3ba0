import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

import { LaunchError } from './launch-error.ts'
import { REPOSITORY_DIRECTORY } from './repository-directory.ts'
import { INTERRUPTED, listenForStop } from './stop-signal.ts'
import { endLeftovers, makeRunMarker, RUN_MARKER } from './test/leftovers.ts'
import { runSteps, type StepResult } from './test/run-steps.ts'
import { listSteps } from './test/steps.ts'
import { summarise } from './test/summary.ts'
import { startTestCluster } from './test-cluster/test-cluster.ts'

const marker = makeRunMarker()
const signal = listenForStop()
const log = (text: string): void => console.log(text)

try {
  const startedAt = performance.now()
  const results = await testInScratchDirectory()
  log(summarise(results, performance.now() - startedAt))
  if (results.some((result) => !result.passed)) process.exitCode = 1
} catch (error) {
  if (signal.aborted) {
    log('\nStopped; nothing is left behind.')
    process.exitCode = INTERRUPTED
  } else {
    console.error(error instanceof LaunchError ? `Fieldfare: ${error.message}` : error)
    process.exitCode = 1
  }
}

async function testInScratchDirectory(): Promise<readonly StepResult[]> {
  const scratchDirectory = await mkdtemp(join(tmpdir(), 'fieldfare-test-'))
  try {
    return await testWithCluster(scratchDirectory)
  } finally {
    for (const commandLine of await endLeftovers(marker))
      log(`Ended a process that a test left behind: ${commandLine}`)
    await rm(scratchDirectory, { recursive: true, force: true })
  }
}

async function testWithCluster(scratchDirectory: string): Promise<readonly StepResult[]> {
  const webDirectory = join(scratchDirectory, 'web')
  log('Starting a throw-away PostgreSQL and Redis')
  const cluster = await startTestCluster()
  try {
    const environment = {
      ...withoutSettings(process.env),
      ...cluster.environment,
      FIELDFARE_TEST_WEB_DIR: webDirectory,
      [RUN_MARKER]: marker,
    }
    const options = { repository: REPOSITORY_DIRECTORY, environment, signal, log }
    return await runSteps(listSteps({ scratchDirectory, webDirectory }), options)
  } finally {
    await cluster.destroy()
  }
}

/** What a person has set for their own instance must not reach the tests. */
function withoutSettings(environment: NodeJS.ProcessEnv): NodeJS.ProcessEnv {
  return Object.fromEntries(Object.entries(environment).filter(([name]) => !name.startsWith('FIELDFARE_')))
}
