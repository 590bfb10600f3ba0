import { startTestCluster } from '@fieldfare/launcher'

/**
 * Uses the cluster that `npm test` started, or starts one of its own when a project runs alone. Vitest demands the
 * names `setup` and `teardown`.
 */
let destroyCluster: (() => Promise<void>) | undefined

export async function setup(): Promise<void> {
  if (process.env['FIELDFARE_TEST_MAINTENANCE_URL'] !== undefined) return
  const cluster = await startTestCluster()
  destroyCluster = cluster.destroy
  Object.assign(process.env, cluster.environment)
}

export async function teardown(): Promise<void> {
  await destroyCluster?.()
}
