import { chmod, readFile, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'

import { z } from 'zod'

import { LaunchError } from '../launch-error.ts'
import { CommandError, runCommand } from '../run-command.ts'
import type { DataDirectory } from './data-directory.ts'

/**
 * Seeding is not one transaction (it works through the running worker), so its state is kept in a file: `unfinished` at
 * the next start means that everything seeded so far is thrown away and made anew.
 */
export type DemoState = 'absent' | 'unfinished' | 'ready'

const stateSchema = z.enum(['absent', 'unfinished', 'ready']).catch('absent')

const signInsSchema = z.array(z.object({ role: z.string(), email: z.string(), password: z.string() }))
export type DemoSignIn = z.infer<typeof signInsSchema>[number]

export async function readDemoState({ demoStateFile }: DataDirectory): Promise<DemoState> {
  return stateSchema.parse((await readFile(demoStateFile, 'utf8').catch(() => '')).trim())
}

/** Removes what an interrupted seeding left outside the database. */
export async function forgetDemo(data: DataDirectory): Promise<void> {
  for (const path of [data.storage, data.cache, data.demoSignInsFile]) {
    await rm(path, { recursive: true, force: true })
  }
  await rm(data.demoStateFile, { force: true })
}

export type SeedOptions = {
  readonly repository: string
  readonly data: DataDirectory
  readonly environment: NodeJS.ProcessEnv
  readonly signal: AbortSignal
  readonly log: (line: string) => void
}

/** Runs the demo seed in a process of its own; API and worker must be running. */
export async function seedDemoOnce({
  repository,
  data,
  environment,
  signal,
  log,
}: SeedOptions): Promise<void> {
  await writeFile(data.demoStateFile, 'unfinished\n')
  try {
    await runCommand({
      name: 'Seeding the demo',
      command: process.execPath,
      commandArguments: ['--import', 'tsx', join(import.meta.dirname, '../seed-main.ts'), repository],
      directory: repository,
      environment,
      signal,
      onLine: log,
    })
  } catch (error) {
    if (error instanceof CommandError) {
      throw new LaunchError(
        `${error.message}. The next start begins the demo anew. Its last lines:\n${error.tail}`,
      )
    }
    throw error
  }
  // A demo without sign-ins is a demo all the same.
  await chmod(data.demoSignInsFile, 0o600).catch(() => undefined)
  await writeFile(data.demoStateFile, 'ready\n')
}

/** Empty when there is no demo. */
export async function readDemoSignIns({ demoSignInsFile }: DataDirectory): Promise<readonly DemoSignIn[]> {
  const text = await readFile(demoSignInsFile, 'utf8').catch(() => '[]')
  return signInsSchema.parse(JSON.parse(text))
}
