import { afterAll } from 'vitest'

type Clean = () => Promise<void>

const cleaners: Clean[] = []

// Registered while the test file imports its support, hence before the file's own hooks, and so run after them:
// what a test still has open is closed by then.
afterAll(async () => {
  const failures: unknown[] = []
  for (const clean of cleaners.splice(0).reverse()) {
    await clean().catch((error: unknown) => failures.push(error))
  }
  if (failures.length > 0) throw new AggregateError(failures, 'Cleaning up after the test file failed.')
})

/** Has `clean` run after the test file's last test and hook; the last registered runs first. */
export function atEndOfFile(clean: Clean): void {
  cleaners.push(clean)
}
