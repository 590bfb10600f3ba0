import { createHash } from 'node:crypto'
import { readdir, readFile, rename, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'

import { LaunchError } from './launch-error.ts'
import { CommandError, runCommand } from './run-command.ts'

export type WebBuildOptions = {
  /** Root of the checkout. */
  readonly repository: string
  /** Receives index.html and its assets; replaced as a whole. */
  readonly outputDirectory: string
  readonly signal: AbortSignal
  /** Called once, before a build starts; not called when the present one is up to date. */
  readonly onBuild?: () => void
}

const SOURCE_DIRECTORIES = ['apps/web', 'packages/contracts']
const SOURCE_FILES = ['vite.config.ts', 'tsconfig.json', 'package-lock.json']
const NOT_SOURCES = /(^|\/)(node_modules|dist|coverage)(\/|$)|\.test\.tsx?$/

/** Builds the web application unless the last build was made from the very same sources. */
export async function buildWeb(options: WebBuildOptions): Promise<void> {
  const { repository, outputDirectory, signal } = options
  const stampFile = `${outputDirectory}.sources`
  const stamp = await hashSources(repository)
  if ((await readFile(stampFile, 'utf8').catch(() => '')) === stamp && (await isThere(outputDirectory)))
    return
  options.onBuild?.()
  const unfinished = `${outputDirectory}.${process.pid}`
  try {
    await runVite(repository, unfinished, signal)
    await rm(stampFile, { force: true })
    await rm(outputDirectory, { recursive: true, force: true })
    await rename(unfinished, outputDirectory)
    await writeFile(stampFile, stamp)
  } finally {
    await rm(unfinished, { recursive: true, force: true })
  }
}

async function runVite(repository: string, outputDirectory: string, signal: AbortSignal): Promise<void> {
  try {
    await runCommand({
      name: 'Building the web application',
      command: process.execPath,
      commandArguments: [
        join(repository, 'node_modules/vite/bin/vite.js'),
        ...['build', '--outDir', outputDirectory, '--emptyOutDir', '--logLevel', 'warn'],
      ],
      directory: repository,
      environment: { ...process.env, NODE_ENV: 'production' },
      signal,
    })
  } catch (error) {
    if (error instanceof CommandError) throw new LaunchError(`${error.message}:\n${error.tail}`)
    throw error
  }
}

async function isThere(outputDirectory: string): Promise<boolean> {
  return readFile(join(outputDirectory, 'index.html')).then(
    () => true,
    () => false,
  )
}

async function hashSources(repository: string): Promise<string> {
  const hash = createHash('sha256')
  const listed = SOURCE_DIRECTORIES.map((directory) => listFiles(repository, directory))
  for (const file of [...SOURCE_FILES, ...(await Promise.all(listed)).flat()]) {
    if (NOT_SOURCES.test(file)) continue
    hash.update(`${file}\0`)
    // A file that is missing, or goes while an editor saves it, counts as empty.
    hash.update(await readFile(join(repository, file)).catch(() => ''))
  }
  return hash.digest('hex')
}

async function listFiles(repository: string, directory: string): Promise<readonly string[]> {
  const entries = await readdir(join(repository, directory), { withFileTypes: true }).catch(() => [])
  const inside = entries
    .filter((entry) => entry.name !== 'node_modules')
    .sort((first, second) => (first.name < second.name ? -1 : 1))
    .map(async (entry) => {
      const path = `${directory}/${entry.name}`
      return entry.isDirectory() ? listFiles(repository, path) : [path]
    })
  return (await Promise.all(inside)).flat()
}
