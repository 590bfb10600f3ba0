import { stat } from 'node:fs/promises'

import { withConnection } from '@fieldfare/launcher'
import { Redis } from 'ioredis'
import { beforeAll, describe, expect, it } from 'vitest'

import { createTestDatabase, temporaryDirectory, testRedis } from '../support/index.ts'

let url: string

beforeAll(async () => {
  url = (await createTestDatabase()).url
})

describe('createTestDatabase', () => {
  it('gives a database on which every migration has run', async () => {
    const { rows } = await withConnection(url, (client) => client.query('select name from knex_migrations'))
    expect(rows.length).toBeGreaterThan(0)
  })

  it('gives each caller a database of its own', async () => {
    const other = await createTestDatabase()
    await withConnection(url, (client) => client.query('create table only_here (id int)'))
    const count = (address: string): Promise<{ rows: unknown[] }> =>
      withConnection(address, (client) =>
        client.query("select 1 from pg_tables where tablename = 'only_here'"),
      )
    expect((await count(url)).rows).toHaveLength(1)
    expect((await count(other.url)).rows).toHaveLength(0)
  })

  it('serves several callers at the same moment', async () => {
    const databases = await Promise.all(Array.from({ length: 4 }, () => createTestDatabase()))
    expect(new Set(databases.map((database) => database.url)).size).toBe(4)
  })
})

describe('testRedis', () => {
  it('gives each caller an empty database that the others do not see', async () => {
    const [first, second] = [new Redis((await testRedis()).url), new Redis((await testRedis()).url)]
    try {
      await first.set('station', 'one')
      expect(await second.get('station')).toBeNull()
      expect(await first.get('station')).toBe('one')
    } finally {
      first.disconnect()
      second.disconnect()
    }
  })
})

describe('temporaryDirectory', () => {
  it('exists and differs from call to call', async () => {
    const [first, second] = [await temporaryDirectory(), await temporaryDirectory('clips')]
    expect((await stat(first)).isDirectory()).toBe(true)
    expect(second).not.toBe(first)
  })
})
