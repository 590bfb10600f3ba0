export { type Cluster, type ClusterOptions, startCluster } from './cluster/cluster.ts'
export { dropDatabase, ensureDatabase, withConnection } from './cluster/databases.ts'
export { REDIS_DATABASE_COUNT } from './cluster/redis.ts'
export { LaunchError } from './launch-error.ts'
export { findFreePort, findFreePortFrom, isPortFree } from './ports.ts'
export {
  type Exit,
  type ProcessOptions,
  readLogTail,
  type RunningProcess,
  startProcess,
} from './processes.ts'
export { REPOSITORY_DIRECTORY } from './repository-directory.ts'
export { buildWeb, type WebBuildOptions } from './web-build.ts'
export { type WaitOptions, WaitTimeoutError, waitUntil } from './wait-until.ts'
export { startTestCluster, TEMPLATE_DATABASE, type TestCluster } from './test-cluster/test-cluster.ts'
