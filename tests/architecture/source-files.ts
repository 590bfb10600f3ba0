import { readdir, readFile } from 'node:fs/promises'
import { join } from 'node:path'

import { REPOSITORY_DIRECTORY } from '@fieldfare/launcher'

export type SourceFile = {
  /** Relative to the root, with forward slashes. */
  readonly path: string
  readonly text: string
}

/** What `.gitignore` names, and git's own folder. */
const NOT_OURS = new Set([
  ...['.git', 'node_modules', 'dist', '.data', '.cache', 'coverage', 'test-results', 'playwright-report'],
])

const TEXT = /(^|\/)(\.[a-z.]+|run|[A-Z]+)$|\.(ts|tsx|js|cjs|json|css|html|md|sh|yml|yaml|svg|csv|txt)$/

/** Every text file of the checkout. The tree is walked, so that an unpacked archive without git is checked as well. */
export async function readSourceFiles(): Promise<readonly SourceFile[]> {
  const paths = (await listFiles('')).filter((path) => TEXT.test(path) && path !== 'package-lock.json')
  return Promise.all(
    paths.map(async (path) => ({ path, text: await readFile(join(REPOSITORY_DIRECTORY, path), 'utf8') })),
  )
}

async function listFiles(directory: string): Promise<readonly string[]> {
  const entries = await readdir(join(REPOSITORY_DIRECTORY, directory), { withFileTypes: true })
  const inside = entries
    .filter((entry) => !NOT_OURS.has(entry.name) && !entry.name.endsWith('.log'))
    .map(async (entry) => {
      const path = directory === '' ? entry.name : `${directory}/${entry.name}`
      return entry.isDirectory() ? listFiles(path) : [path]
    })
  return (await Promise.all(inside)).flat()
}
