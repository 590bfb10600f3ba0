import {
  changePassword,
  endSession,
  getSession,
  listSessions,
  refreshSession,
  signIn,
  signOutEverywhere,
  streamEvents,
} from '@fieldfare/contracts'
import jsonwebtoken from 'jsonwebtoken'
import { beforeAll, describe, expect, it } from 'vitest'
import { createSessionTokens } from '../../apps/api/src/http/session-tokens.ts'
import { startTestApi, TEST_PASSWORD, TEST_TOKEN_SECRET, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'

let api: TestApi

beforeAll(async () => {
  api = await startTestApi()
})

async function signInWithPassword(): Promise<TestClient> {
  const user = await api.createUser('clerk')
  const client = api.anonymous()
  await client.json(signIn, { body: { email: user.email, password: TEST_PASSWORD } })
  return client
}

/** Moves the last exchange of a session into the past, since the grace is measured by the database's clock. */
async function passGrace(): Promise<void> {
  await api
    .database('refresh_tokens')
    .whereNotNull('rotated_at')
    .update({ rotated_at: new Date(Date.now() - 60_000) })
}

describe('access tokens', () => {
  const claimsOf = (token: string): Record<string, unknown> => {
    const decoded = jsonwebtoken.decode(token)
    if (typeof decoded !== 'object' || decoded === null) throw new Error('no claims')
    return decoded
  }

  it('are refused when they are expired', async () => {
    const { client, user, sessionId } = await api.signInAs('clerk')
    const past = new Date(Date.now() - 601_000)
    const token = createSessionTokens(TEST_TOKEN_SECRET).issueAccessToken(
      { userId: user.userId, sessionId },
      past,
    )
    client.cookies.set('fieldfare_access', token)
    expect(await client.problem(getSession)).toMatchObject({ code: 'not-signed-in' })
  })

  it.each([
    ['of another secret', (claims: object) => jsonwebtoken.sign(claims, 'x'.repeat(40))],
    ['signed with the bare secret', (claims: object) => jsonwebtoken.sign(claims, TEST_TOKEN_SECRET)],
    ['without a signature', (claims: object) => jsonwebtoken.sign(claims, '', { algorithm: 'none' })],
    ['that are no token', () => 'a.b.c'],
  ])('are refused when they are forged: %s', async (_name, forge) => {
    const { client } = await api.signInAs('admin')
    const genuine = client.cookies.get('fieldfare_access') ?? ''
    client.cookies.set('fieldfare_access', forge(claimsOf(genuine)))
    expect(await client.problem(getSession)).toMatchObject({ code: 'not-signed-in', status: 401 })
  })

  it('are refused when the session is another user’s', async () => {
    const { client, user } = await api.signInAs('admin')
    const other = await api.signInAs('clerk')
    const token = createSessionTokens(TEST_TOKEN_SECRET).issueAccessToken(
      { userId: user.userId, sessionId: other.sessionId },
      new Date(),
    )
    client.cookies.set('fieldfare_access', token)
    expect((await client.problem(getSession)).status).toBe(401)
  })
})

describe('refreshing', () => {
  it('gives a new pair each time', async () => {
    const client = await signInWithPassword()
    const before = new Map(client.cookies)
    client.cookies.delete('fieldfare_access')
    await client.json(refreshSession)
    expect(client.cookies.get('fieldfare_refresh')).not.toBe(before.get('fieldfare_refresh'))
    expect((await client.json(getSession)).user.role).toBe('clerk')
  })

  it('lets two tabs exchange the same token at the same moment', async () => {
    const client = await signInWithPassword()
    const refresh = client.cookies.get('fieldfare_refresh') ?? ''
    const tabs = [api.anonymous(), api.anonymous()]
    for (const tab of tabs) tab.cookies.set('fieldfare_refresh', refresh)
    const statuses = await Promise.all(tabs.map(async (tab) => (await tab.call(refreshSession)).status))
    expect(statuses).toEqual([200, 200])
  })

  it('ends the session for everybody when an old token is used again', async () => {
    const client = await signInWithPassword()
    const thief = api.anonymous()
    thief.cookies.set('fieldfare_refresh', client.cookies.get('fieldfare_refresh') ?? '')
    await client.json(refreshSession)
    await passGrace()
    expect(await thief.problem(refreshSession)).toMatchObject({ status: 401, code: 'not-signed-in' })
    expect((await client.problem(getSession)).status).toBe(401)
    expect((await client.problem(refreshSession)).status).toBe(401)
    const audited = await api.database('audit_events').where({ action: 'end-session' })
    expect(audited).toHaveLength(1)
  })

  it('refuses an unknown or missing token and clears the cookies', async () => {
    const client = api.anonymous()
    expect((await client.problem(refreshSession)).status).toBe(401)
    client.cookies.set('fieldfare_refresh', 'A'.repeat(43))
    expect((await client.problem(refreshSession)).status).toBe(401)
    expect(client.cookies.has('fieldfare_refresh')).toBe(false)
  })
})

describe('refreshing while the database does not answer', () => {
  it('fails, and leaves the session to be refreshed later', async () => {
    const client = await signInWithPassword()
    await api.database.schema.renameTable('refresh_tokens', 'refresh_tokens_away')
    expect((await client.problem(refreshSession)).status).toBe(500)
    await api.database.schema.renameTable('refresh_tokens_away', 'refresh_tokens')
    await client.json(refreshSession)
  })
})

describe('own sessions', () => {
  it('are listed with the present one marked, and can be ended one by one', async () => {
    const first = await api.signInAs('auditor')
    const second = await api.openSession(first.user)
    const { items } = await first.client.json(listSessions)
    expect(items.filter((session) => session.isCurrent).map((session) => session.id)).toEqual([
      first.sessionId,
    ])
    expect(items).toHaveLength(2)
    await first.client.call(endSession, { params: { sessionId: second.sessionId } })
    expect((await second.client.problem(getSession)).status).toBe(401)
    expect((await first.client.call(getSession)).status).toBe(200)
  })

  it('of somebody else cannot be ended', async () => {
    const [mine, theirs] = [await api.signInAs('clerk'), await api.signInAs('clerk')]
    const problem = await mine.client.problem(endSession, { params: { sessionId: theirs.sessionId } })
    expect(problem.code).toBe('not-found')
    expect((await theirs.client.call(getSession)).status).toBe(200)
  })

  it('all end when signing out everywhere', async () => {
    const first = await api.signInAs('publisher')
    const second = await api.openSession(first.user)
    expect((await first.client.call(signOutEverywhere)).status).toBe(204)
    expect((await second.client.problem(getSession)).status).toBe(401)
    expect((await first.client.problem(getSession)).status).toBe(401)
  })
})

describe('changing the password', () => {
  it('needs the present one', async () => {
    const { client } = await api.signInAs('clerk')
    const body = { currentPassword: 'not the password', newPassword: 'a quite different one' }
    expect((await client.problem(changePassword, { body })).fieldErrors).toMatchObject([
      { path: 'currentPassword' },
    ])
  })

  it('keeps this session and ends the others', async () => {
    const { client, user } = await api.signInAs('clerk')
    const other = await api.openSession(user)
    const body = { currentPassword: TEST_PASSWORD, newPassword: 'a quite different one' }
    expect((await client.call(changePassword, { body })).status).toBe(204)
    expect((await client.call(getSession)).status).toBe(200)
    expect((await other.client.problem(getSession)).status).toBe(401)
    const fresh = api.anonymous()
    expect((await fresh.call(signIn, { body: { email: user.email, password: TEST_PASSWORD } })).status).toBe(
      401,
    )
    expect(
      (await fresh.call(signIn, { body: { email: user.email, password: body.newPassword } })).status,
    ).toBe(200)
  })

  it('refuses more than 72 bytes, counted as bytes, rather than cutting', async () => {
    const { client } = await api.signInAs('clerk')
    const body = { currentPassword: TEST_PASSWORD, newPassword: 'é'.repeat(37) }
    const problem = await client.problem(changePassword, { body })
    expect(problem.fieldErrors).toMatchObject([{ path: 'newPassword' }])
    const ligatures = { currentPassword: TEST_PASSWORD, newPassword: 'ﬃ'.repeat(24) }
    // 72 bytes as typed; the normalised form is what bcrypt would see, and that one fits.
    expect((await client.call(changePassword, { body: ligatures })).status).toBe(204)
  })
})

describe('cross-site requests', () => {
  it('are refused without, with a wrong, or with somebody else’s CSRF token', async () => {
    const { client } = await api.signInAs('clerk')
    const own = client.cookies.get('fieldfare_csrf') ?? ''
    const attempt = async (cookie: string | null, header: string) => {
      if (cookie === null) client.cookies.delete('fieldfare_csrf')
      else client.cookies.set('fieldfare_csrf', cookie)
      return client.problem(signOutEverywhere, { headers: { 'x-csrf-token': header } })
    }
    const foreign = (await api.signInAs('clerk')).client.cookies.get('fieldfare_csrf') ?? ''
    for (const [cookie, header] of [
      [own, ''],
      [null, own],
      [own, `${own}x`],
      [foreign, foreign],
      ['a.b', 'a.b'],
    ] as const) {
      expect(await attempt(cookie, header)).toMatchObject({ status: 403, code: 'csrf-failed' })
    }
    client.cookies.set('fieldfare_csrf', own)
    expect((await client.call(getSession)).status).toBe(200)
  })

  it('are refused from another origin, and allowed from our own', async () => {
    const user = await api.createUser('clerk')
    const body = { email: user.email, password: TEST_PASSWORD }
    const from = (headers: Record<string, string>) => api.anonymous().call(signIn, { body, headers })
    expect((await from({ origin: 'https://elsewhere.example' })).status).toBe(403)
    expect((await from({ origin: 'null' })).status).toBe(403)
    expect((await from({ 'sec-fetch-site': 'cross-site' })).status).toBe(403)
    expect((await from({ origin: 'http://fieldfare.test' })).status).toBe(200)
    expect((await from({ origin: api.url })).status).toBe(200)
  })
})

describe('an open event stream', () => {
  it('ends when its session does', async () => {
    const { client, user } = await api.signInAs('clerk')
    const response = await client.fetch(streamEvents)
    expect(response.headers.get('content-type')).toMatch(/^text\/event-stream/)
    const other = await api.openSession(user)
    const ended = response.text()
    await other.client.call(signOutEverywhere)
    expect(await ended).toContain('retry: 3000')
  })
})
