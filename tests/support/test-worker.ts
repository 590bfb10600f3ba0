import { startWorker } from '@fieldfare/worker'
import { pino } from 'pino'
import { atEndOfFile } from './end-of-file.ts'
import type { TestApi } from './test-api.ts'

export type TestWorker = { stop: () => Promise<void> }

/**
 * A real worker on the database, queue and storage of the API under test. It is stopped at the end of the test file, or
 * earlier by a test that wants work to wait.
 */
export async function startTestWorker(api: TestApi): Promise<TestWorker> {
  const worker = await startWorker(api.configuration, pino({ level: 'silent' }))
  let stopping: Promise<void> | undefined
  const stop = () => (stopping ??= worker.stop())
  atEndOfFile(stop)
  return { stop }
}
