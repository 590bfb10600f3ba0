import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll } from 'vitest'

/** A folder for one test file, removed afterwards; returns a function that names a file in it. */
export function useTemporaryFolder(): (fileName: string) => string {
  let folder = ''
  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'fieldfare-audio-'))
  })
  afterAll(() => rm(folder, { recursive: true, force: true }))
  return (fileName) => join(folder, fileName)
}
