import { mkdir } from 'node:fs/promises'
import { join } from 'node:path'

import { buildWeb, REPOSITORY_DIRECTORY } from '@fieldfare/launcher'

/**
 * The built web application, for FIELDFARE_WEB_DIR: what `npm test` has built, or, when a project runs alone, a build of
 * the tests' own that is renewed when the sources changed.
 */
export async function webDirectory(): Promise<string> {
  const built = process.env['FIELDFARE_TEST_WEB_DIR']
  if (built !== undefined) return built
  const cache = join(REPOSITORY_DIRECTORY, '.cache')
  await mkdir(cache, { recursive: true })
  const outputDirectory = join(cache, 'test-web')
  await buildWeb({
    repository: REPOSITORY_DIRECTORY,
    outputDirectory,
    signal: new AbortController().signal,
  })
  return outputDirectory
}
