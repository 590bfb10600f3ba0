import { Worker } from 'node:worker_threads'
import { afterEach, describe, expect, it } from 'vitest'
import { createThreadPool, type ThreadPool } from './thread-pool.ts'

/** A thread that answers one task as if it had read silence, then dies of an error with nothing to do. */
const ANSWERS_ONCE = `
  const { parentPort } = require('node:worker_threads')
  parentPort.once('message', () => {
    parentPort.postMessage({ kind: 'done', result: { landmarkHashes: 0 } })
    setImmediate(() => { throw new Error('dead') })
  })`

let pool: ThreadPool
afterEach(() => pool.close())

describe('a thread that dies between two tasks', () => {
  it('is replaced: the next task is done, and the process lives on', async () => {
    const exits: Promise<unknown>[] = []
    pool = createThreadPool(1, () => {
      const worker = new Worker(ANSWERS_ONCE, { eval: true })
      exits.push(new Promise((resolve) => worker.once('exit', resolve)))
      return worker
    })
    const { signal } = new AbortController()
    await pool.fingerprint('first', signal)
    await Promise.all(exits)
    await expect(pool.fingerprint('second', signal)).resolves.toMatchObject({ landmarkHashes: 0 })
    expect(exits).toHaveLength(2)
  })
})
