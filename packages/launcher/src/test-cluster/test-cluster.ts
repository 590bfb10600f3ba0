import { execFile } from 'node:child_process'
import { mkdtemp } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { promisify } from 'node:util'

import { type Cluster, startCluster } from '../cluster/cluster.ts'
import { ensureDatabase } from '../cluster/databases.ts'
import { REPOSITORY_DIRECTORY } from '../repository-directory.ts'

const run = promisify(execFile)

/** Every test database is a copy of this one, which is migrated and otherwise empty. */
export const TEMPLATE_DATABASE = 'fieldfare_template'

/** How the tests find the cluster that runs for them. */
export type TestClusterEnvironment = {
  readonly FIELDFARE_TEST_MAINTENANCE_URL: string
  readonly FIELDFARE_TEST_REDIS_URL: string
}

export type TestCluster = {
  readonly environment: TestClusterEnvironment
  readonly processes: Cluster['processes']
  readonly destroy: () => Promise<void>
}

/** Starts a throw-away PostgreSQL and Redis in the system's temporary directory and migrates the template. */
export async function startTestCluster(): Promise<TestCluster> {
  const directory = await mkdtemp(join(tmpdir(), 'fieldfare-test-cluster-'))
  const cluster = await startCluster({ directory, durability: 'throwaway' })
  try {
    await ensureDatabase(cluster, TEMPLATE_DATABASE)
    await migrateTemplate(cluster.databaseUrl(TEMPLATE_DATABASE))
  } catch (error) {
    await cluster.destroy()
    throw error
  }
  return {
    environment: {
      FIELDFARE_TEST_MAINTENANCE_URL: cluster.databaseUrl('postgres'),
      FIELDFARE_TEST_REDIS_URL: cluster.redisUrl,
    },
    processes: cluster.processes,
    destroy: cluster.destroy,
  }
}

/** In a process of its own, because vitest would load the migrations by other rules than `npm start` does. */
async function migrateTemplate(databaseUrl: string): Promise<void> {
  const program = join(import.meta.dirname, '../migrate-main.ts')
  await run(process.execPath, ['--import', 'tsx', program], {
    cwd: REPOSITORY_DIRECTORY,
    env: { ...process.env, FIELDFARE_DATABASE_URL: databaseUrl },
  })
}
