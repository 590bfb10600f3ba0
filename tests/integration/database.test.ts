import {
  applySort,
  containsPattern,
  createDatabase,
  fetchPage,
  inTransaction,
  insertUser,
  recordAudit,
  sortOrder,
  violates,
  type Database,
} from '@fieldfare/database'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestDatabase } from '../support/index.ts'

let database: Database

beforeAll(async () => {
  const { url } = await createTestDatabase()
  database = createDatabase({ databaseUrl: url, applicationName: 'fieldfare-test' })
})

afterAll(() => database.destroy())

describe('values from PostgreSQL', () => {
  it('arrive as bigint, UTC instant and plain date', async () => {
    const [row] = await database.select<Record<string, unknown>[]>(
      database.raw("9007199254740993::bigint as big, timestamptz '2026-10-25 01:30:00+01' as moment"),
      database.raw("date '2026-11-29' as day, null::timestamptz as nothing, '{\"a\":1}'::jsonb as document"),
    )
    expect(row).toEqual({
      big: 9_007_199_254_740_993n,
      moment: '2026-10-25T00:30:00.000Z',
      day: '2026-11-29',
      nothing: null,
      document: { a: 1 },
    })
  })
})

describe('inTransaction', () => {
  it('names the constraint that refused a row', async () => {
    const add = () =>
      inTransaction(database, (trx) =>
        insertUser(trx, { email: 'twice@example.org', name: 'Twice', role: 'clerk', status: 'invited' }),
      )
    await add()
    const error: unknown = await add().catch((caught: unknown) => caught)
    expect(error).toMatchObject({ name: 'ConstraintViolation', kind: 'unique', table: 'users' })
    expect(violates(error, 'users_email_key')).toBe(true)
    expect(violates(error, 'users_pkey')).toBe(false)
    expect(violates(new Error('something else'), 'users_email_key')).toBe(false)
  })

  it('leaves nothing behind when the work fails', async () => {
    const failing = inTransaction(database, async (trx) => {
      await recordAudit(trx, {
        actor: null,
        action: 'test',
        subjectKind: 'test',
        subjectId: '1',
        summary: 'Never.',
      })
      throw new Error('no')
    })
    await expect(failing).rejects.toThrow('no')
    expect(await database('audit_events')).toHaveLength(0)
  })

  it('runs work again after a serialization failure', async () => {
    let runs = 0
    const count = async () =>
      inTransaction(
        database,
        async (trx) => {
          runs += 1
          await trx('society').select('name')
          // The other transaction reads the same row before either writes, so one of the two must be repeated.
          if (runs <= 2) await waitForOther()
          await trx('society').update({ name: trx.raw("name || '+'") })
        },
        { isolation: 'serializable' },
      )
    const arrived: (() => void)[] = []
    const waitForOther = () =>
      new Promise<void>((resolve) => {
        arrived.push(resolve)
        if (arrived.length === 2) for (const go of arrived) go()
      })
    await Promise.all([count(), count()])
    expect(runs).toBeGreaterThan(2)
    const [society] = await database('society').select<{ name: string }[]>('name')
    expect(society?.name).toMatch(/[^+]\+\+$/)
  })
})

describe('lists', () => {
  it('are sorted, counted whole and cut into pages that never overlap', async () => {
    const numbers = database.raw('(select n, n % 3 as bucket from generate_series(1, 10) n) as numbers')
    const query = applySort(database.from(numbers).select('n'), { bucket: 'bucket' }, '-bucket', 'n')
    const pages = await Promise.all(
      [1, 2, 3].map((page) => fetchPage<{ n: number }>(database, query, { page, pageSize: 4 })),
    )
    expect(pages.map((page) => page.total)).toEqual([10, 10, 10])
    expect(pages.flatMap((page) => page.items.map((item) => item.n))).toEqual([8, 5, 2, 10, 7, 4, 1, 9, 6, 3])
  })

  it('take only whitelisted columns to sort by', () => {
    expect(() => sortOrder({ title: 'title' }, 'title; drop table users')).toThrow(RangeError)
    expect(() => sortOrder({ title: 'title' }, 'constructor')).toThrow(RangeError)
  })

  it('look for what was typed, letter by letter', () => {
    expect(containsPattern('50%_\\')).toBe('%50\\%\\_\\\\%')
  })
})
