import { link, readFile, rename, rm, writeFile } from 'node:fs/promises'

import { z } from 'zod'

import { hasCode } from './error-code.ts'
import { isRunning, ownIdentity } from './process-identity.ts'

export type Lock = { readonly release: () => Promise<void> }

export class LockHeldError extends Error {
  override readonly name = 'LockHeldError'
  readonly pid: number

  constructor(pid: number) {
    super(`Process ${pid} holds the lock.`)
    this.pid = pid
  }
}

const holderSchema = z.object({ pid: z.number().int(), startTicks: z.string() })

/**
 * Takes the lock file for as long as this process lives. A lock left by a process that was killed is taken over.
 *
 * @throws {@link LockHeldError} when another living process holds it
 */
export async function acquireLock(path: string): Promise<Lock> {
  const claim = `${path}.${process.pid}`
  await writeFile(claim, JSON.stringify(await ownIdentity()), { mode: 0o600 })
  try {
    while (true) {
      try {
        // A hard link appears whole or not at all, so nobody ever reads a half-written holder.
        await link(claim, path)
        return { release: () => rm(path, { force: true }) }
      } catch (error) {
        if (!hasCode(error, 'EEXIST')) throw error
      }
      await clearStaleLock(path)
    }
  } finally {
    await rm(claim, { force: true })
  }
}

async function clearStaleLock(path: string): Promise<void> {
  const holder = await readHolder(path)
  if (holder !== undefined && (await isRunning(holder))) throw new LockHeldError(holder.pid)
  const aside = `${path}.stale.${process.pid}`
  try {
    await rename(path, aside)
  } catch (error) {
    if (!hasCode(error, 'ENOENT')) throw error
  }
  await rm(aside, { force: true })
}

async function readHolder(path: string): Promise<z.infer<typeof holderSchema> | undefined> {
  try {
    return holderSchema.parse(JSON.parse(await readFile(path, 'utf8')))
  } catch {
    // Gone in the meantime or damaged: neither names a living holder.
    return undefined
  }
}
