import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

import { afterEach, beforeEach, describe, expect, it } from 'vitest'

import { acquireLock, LockHeldError } from './lock.ts'
import { ownIdentity } from './process-identity.ts'

let directory: string
let path: string

beforeEach(async () => {
  directory = await mkdtemp(join(tmpdir(), 'fieldfare-lock-'))
  path = join(directory, 'lock')
})

afterEach(async () => {
  await rm(directory, { recursive: true })
})

describe('acquireLock', () => {
  it('refuses while its holder lives, and names the holder', async () => {
    const lock = await acquireLock(path)
    await expect(acquireLock(path)).rejects.toThrow(new LockHeldError(process.pid))
    await lock.release()
  })

  it('can be taken again after it was released', async () => {
    await (await acquireLock(path)).release()
    await expect(acquireLock(path)).resolves.toBeDefined()
  })

  it('takes over from a process that is gone, even when its number went to another', async () => {
    const { pid } = await ownIdentity()
    await writeFile(path, JSON.stringify({ pid, startTicks: '1' }))
    await acquireLock(path)
    expect(JSON.parse(await readFile(path, 'utf8'))).toEqual(await ownIdentity())
  })

  it('takes over a lock file that was damaged', async () => {
    await writeFile(path, '{"pid":')
    await expect(acquireLock(path)).resolves.toBeDefined()
  })
})
