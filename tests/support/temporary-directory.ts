import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

import { atEndOfFile } from './end-of-file.ts'

/** A fresh directory, deleted at the end of the test file; for stored audio, caches and generated files. */
export async function temporaryDirectory(purpose = 'storage'): Promise<string> {
  const directory = await mkdtemp(join(tmpdir(), `fieldfare-test-${purpose}-`))
  atEndOfFile(() => rm(directory, { recursive: true, force: true }))
  return directory
}
