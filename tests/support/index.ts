export { findFreePort, WaitTimeoutError, waitUntil } from '@fieldfare/launcher'

export { atEndOfFile } from './end-of-file.ts'
export { type LogEntry, type RecordingLogger, silentLogger } from './silent-logger.ts'
export { temporaryDirectory } from './temporary-directory.ts'
export { createTestDatabase, type TestDatabase } from './test-database.ts'
export { type TestRedis, testRedis } from './test-redis.ts'
export { webDirectory } from './web-directory.ts'
