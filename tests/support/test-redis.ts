import { REDIS_DATABASE_COUNT } from '@fieldfare/launcher'
import { Redis } from 'ioredis'

import { atEndOfFile } from './end-of-file.ts'
import { readTestEnvironment } from './test-environment.ts'

export type TestRedis = {
  /** Connection string of an empty logical database; give it to the code under test as its FIELDFARE_REDIS_URL. */
  readonly url: string
}

/** Redis database 0 holds nothing but the count of databases handed out. */
const COUNTER = 'fieldfare:test-databases'

/** An empty Redis database of this test file's own, emptied again at its end. */
export async function testRedis(): Promise<TestRedis> {
  const address = new URL(readTestEnvironment('FIELDFARE_TEST_REDIS_URL'))
  const handedOut = await withRedis(address.href, (client) => client.incr(COUNTER))
  address.pathname = `/${1 + ((handedOut - 1) % (REDIS_DATABASE_COUNT - 1))}`
  const empty = (): Promise<unknown> => withRedis(address.href, (client) => client.flushdb())
  await empty()
  atEndOfFile(async () => {
    await empty()
  })
  return { url: address.href }
}

async function withRedis<Result>(url: string, work: (client: Redis) => Promise<Result>): Promise<Result> {
  const client = new Redis(url, { lazyConnect: true, maxRetriesPerRequest: 1 })
  await client.connect()
  try {
    return await work(client)
  } finally {
    client.disconnect()
  }
}
