import {
  getSession,
  getSystemHealth,
  getUser,
  inviteUser,
  listAuditEvents,
  listInbox,
  listUsers,
  updateUser,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, type TestApi } from '../support/test-api.ts'

let api: TestApi

beforeAll(async () => {
  api = await startTestApi()
})

const change = (role: string, status: string) => ({ name: 'Changed', role, status })

describe('users', () => {
  it('are listed in pages and found by name or address', async () => {
    const { client } = await api.signInAs('admin')
    const user = await api.createUser('auditor')
    const found = await client.json(listUsers, { query: { search: user.email.slice(0, 20).toUpperCase() } })
    expect(found.items.map((item) => item.id)).toEqual([user.userId])
    const page = await client.json(listUsers, { query: { pageSize: '1', page: '2' } })
    expect(page.items).toHaveLength(1)
    expect(page.total).toBeGreaterThan(1)
    expect((await client.json(listUsers, { query: { search: '%' } })).total).toBe(0)
  })

  it('lose their sessions when their role changes, and keep them when only the name does', async () => {
    const admin = await api.signInAs('admin')
    const clerk = await api.signInAs('clerk')
    const params = { userId: clerk.user.userId }
    await admin.client.json(updateUser, { params, body: change('clerk', 'active') })
    expect((await clerk.client.json(getSession)).user.name).toBe('Changed')
    await admin.client.json(updateUser, { params, body: change('auditor', 'active') })
    expect((await clerk.client.problem(getSession)).status).toBe(401)
    const trail = await admin.client.json(listAuditEvents, {
      query: { subjectKind: 'user', subjectId: params.userId },
    })
    expect(trail.items[0]).toMatchObject({ action: 'update-user', actorName: 'Test admin' })
    expect(trail.items[0]?.summary).toContain('role now Auditor')
  })

  it('cannot disable or demote themselves', async () => {
    const { client, user } = await api.signInAs('admin')
    const params = { userId: user.userId }
    expect((await client.problem(updateUser, { params, body: change('admin', 'disabled') })).code).toBe(
      'not-allowed',
    )
    expect((await client.problem(updateUser, { params, body: change('clerk', 'active') })).code).toBe(
      'not-allowed',
    )
  })

  it('keep one administrator even when two demote each other at once', async () => {
    const lonely = await startTestApi()
    const [first, second] = [await lonely.signInAs('admin'), await lonely.signInAs('admin')]
    await Promise.all([
      first.client.call(updateUser, {
        params: { userId: second.user.userId },
        body: change('clerk', 'active'),
      }),
      second.client.call(updateUser, {
        params: { userId: first.user.userId },
        body: change('clerk', 'active'),
      }),
    ])
    expect(await lonely.database('users').where({ role: 'admin', status: 'active' })).toHaveLength(1)
  })

  it('are told at the field that a scope is needed or gone', async () => {
    const { client } = await api.signInAs('admin')
    const body = {
      email: 'scope@example.org',
      name: 'Scope',
      role: 'uploader',
      stationIds: new Array<string>(),
    }
    expect((await client.problem(inviteUser, { body })).fieldErrors).toMatchObject([{ path: 'stationIds' }])
    const gone = { ...body, stationIds: ['00000000-0000-4000-8000-000000000000'] }
    expect((await client.problem(inviteUser, { body: gone })).fieldErrors).toMatchObject([
      { path: 'stationIds' },
    ])
    expect(await api.database('users').where({ email: 'scope@example.org' })).toHaveLength(0)
  })

  it('who are not there answer 404, ids that are none 422', async () => {
    const { client } = await api.signInAs('admin')
    const unknown = { userId: '00000000-0000-4000-8000-000000000000' }
    expect((await client.problem(getUser, { params: unknown })).status).toBe(404)
    expect((await client.problem(getUser, { params: { userId: 'x' } })).fieldErrors).toMatchObject([
      { path: 'userId' },
    ])
  })
})

describe('the system', () => {
  it('tells of database, queue, storage and jobs', async () => {
    const { client } = await api.signInAs('admin')
    const health = await client.json(getSystemHealth)
    expect(health.database.ok).toBe(true)
    expect(health.database.version).toMatch(/^15/)
    expect(health.redis.ok).toBe(true)
    expect(health.storage).toMatchObject({ kind: 'disk', ok: true, objects: 0 })
    expect(health.queues.map((queue) => queue.kind)).toContain('send-mail')
  })

  it('has no inbox where mail is sent for real', async () => {
    const real = await startTestApi({ FIELDFARE_MAIL: 'smtp', FIELDFARE_SMTP_URL: 'smtp://127.0.0.1:2525' })
    const { client } = await real.signInAs('admin')
    expect((await client.problem(listInbox)).status).toBe(404)
  })

  it('keeps the audit trail from being changed', async () => {
    const { client, user } = await api.signInAs('admin')
    await client.json(updateUser, { params: { userId: user.userId }, body: change('admin', 'active') })
    await expect(api.database('audit_events').update({ summary: 'nothing happened' })).rejects.toThrow(
      /never changed/,
    )
    await expect(api.database('audit_events').delete()).rejects.toThrow(/never changed/)
    await expect(api.database.raw('truncate audit_events')).rejects.toThrow(/never changed/)
  })
})
