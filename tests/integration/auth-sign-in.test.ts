import { getSession, signIn, signOut } from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, TEST_PASSWORD, type TestApi } from '../support/test-api.ts'

let api: TestApi

beforeAll(async () => {
  api = await startTestApi()
})

describe('signing in', () => {
  it('sets httpOnly cookies, a readable CSRF cookie, and tells who is signed in', async () => {
    const user = await api.createUser('clerk')
    const client = api.anonymous()
    const response = await client.fetch(signIn, { body: { email: user.email, password: TEST_PASSWORD } })
    expect(response.status).toBe(200)
    const cookies = response.headers.getSetCookie()
    const named = (name: string) => cookies.find((cookie) => cookie.startsWith(`${name}=`)) ?? ''
    expect(named('fieldfare_access')).toMatch(/Path=\/api;.*HttpOnly; SameSite=Lax/)
    expect(named('fieldfare_refresh')).toMatch(/Path=\/api\/auth;.*HttpOnly; SameSite=Lax/)
    expect(named('fieldfare_csrf')).not.toContain('HttpOnly')
    const session = await client.json(getSession)
    expect(session.user).toMatchObject({
      id: user.userId,
      email: user.email,
      role: 'clerk',
      stations: [],
      parties: [],
    })
    expect(session.hasLocalInbox).toBe(true)
  })

  it('ends at once at sign-out, for the access token too', async () => {
    const { client } = await api.signInAs('auditor')
    const copy = new Map(client.cookies)
    expect((await client.call(signOut)).status).toBe(204)
    expect(client.cookies.has('fieldfare_access')).toBe(false)
    for (const [name, value] of copy) client.cookies.set(name, value)
    expect(await client.problem(getSession)).toMatchObject({ code: 'not-signed-in', status: 401 })
  })
})
