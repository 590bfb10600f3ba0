import { execFile } from 'node:child_process'
import { join } from 'node:path'
import { promisify } from 'node:util'

import { REPOSITORY_DIRECTORY } from '@fieldfare/launcher'
import { z } from 'zod'

const cruiseSchema = z.object({
  modules: z.array(
    z.object({
      source: z.string(),
      dependencies: z.array(z.object({ resolved: z.string(), couldNotResolve: z.boolean() })),
    }),
  ),
  summary: z.object({
    violations: z.array(z.object({ from: z.string(), to: z.string(), rule: z.object({ name: z.string() }) })),
    ruleSetUsed: z.object({ forbidden: z.array(z.object({ name: z.string() })) }),
  }),
})

export type Cruise = z.infer<typeof cruiseSchema>

const CRUISER = join(REPOSITORY_DIRECTORY, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs')

/** Reads every module under `folders` by the rules of the directory's own `.dependency-cruiser.cjs`. */
export async function cruise(directory: string, folders: readonly string[]): Promise<Cruise> {
  const commandArguments = [
    CRUISER,
    '--config',
    '.dependency-cruiser.cjs',
    '--output-type',
    'json',
    ...folders,
  ]
  const { stdout } = await promisify(execFile)(process.execPath, commandArguments, {
    cwd: directory,
    maxBuffer: 512 * 1024 * 1024,
  })
  return cruiseSchema.parse(JSON.parse(stdout))
}
