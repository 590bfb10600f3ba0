import {
  acceptInvitation,
  changePassword,
  getSession,
  inviteUser,
  listInbox,
  readInvitation,
  requestPasswordReset,
  resetPassword,
  signIn,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, TEST_PASSWORD, type TestApi } from '../support/test-api.ts'

let api: TestApi

beforeAll(async () => {
  api = await startTestApi()
})

async function lastLinkTo(email: string): Promise<string> {
  const mails: { id: string; body: string }[] = await api
    .database('mail_messages')
    .where({ recipient: email })
    .orderBy('created_at', 'desc')
    .select('id', 'body')
  return /#token=([A-Za-z0-9_-]{43})/.exec(mails[0]?.body ?? '')?.[1] ?? ''
}

async function invite(email: string, name = 'Nell Ashby') {
  const { client } = await api.signInAs('admin')
  const invited = await client.json(inviteUser, {
    body: { email, name, role: 'clerk', stationIds: [], partyIds: [] },
  })
  return { client, invited }
}

describe('an invitation', () => {
  it('is mailed, with a job in the same transaction, and makes a user who is signed in', async () => {
    const { client, invited } = await invite('nell@example.org')
    expect(invited.status).toBe('invited')
    const inbox = await client.json(listInbox)
    expect(inbox.items[0]).toMatchObject({ to: 'nell@example.org', sentAt: null })
    expect(inbox.items[0]?.text).toContain('http://fieldfare.test/invitation#token=')
    const jobs = await api.database('jobs').where({ kind: 'send-mail', status: 'waiting' })
    expect(jobs).toHaveLength(1)

    const token = await lastLinkTo('nell@example.org')
    const person = api.anonymous()
    expect(await person.json(readInvitation, { body: { token } })).toMatchObject({
      email: 'nell@example.org',
      role: 'clerk',
    })
    await person.json(acceptInvitation, {
      body: { token, name: 'Nell A. Ashby', password: 'a password of my own' },
    })
    expect((await person.json(getSession)).user).toMatchObject({ name: 'Nell A. Ashby', role: 'clerk' })
    const body = { email: 'nell@example.org', password: 'a password of my own' }
    expect((await api.anonymous().call(signIn, { body })).status).toBe(200)
  })

  it('works once, however many use it at the same moment', async () => {
    await invite('once@example.org')
    const token = await lastLinkTo('once@example.org')
    const accept = () =>
      api
        .anonymous()
        .call(acceptInvitation, { body: { token, name: 'Once', password: 'a password of my own' } })
    const statuses = (await Promise.all([accept(), accept(), accept()])).map((answer) => answer.status)
    expect(statuses.toSorted((left, right) => left - right)).toEqual([200, 410, 410])
    expect((await accept()).status).toBe(410)
  })

  it('sent again makes the older link useless', async () => {
    await invite('again@example.org')
    const older = await lastLinkTo('again@example.org')
    await invite('again@example.org', 'Another Name')
    expect((await api.anonymous().call(readInvitation, { body: { token: older } })).status).toBe(410)
    const token = await lastLinkTo('again@example.org')
    expect((await api.anonymous().json(readInvitation, { body: { token } })).name).toBe('Another Name')
  })

  it('runs out', async () => {
    await invite('late@example.org')
    await api
      .database('account_tokens')
      .update({ expires_at: new Date(Date.now() - 1000) })
      .whereNull('used_at')
    const token = await lastLinkTo('late@example.org')
    expect((await api.anonymous().problem(readInvitation, { body: { token } })).code).toBe('link-expired')
  })

  it('to somebody who is a user already is refused at the field', async () => {
    const user = await api.createUser('auditor')
    const { client } = await api.signInAs('admin')
    const body = { email: user.email, name: 'Twice', role: 'clerk' }
    expect((await client.problem(inviteUser, { body })).fieldErrors).toMatchObject([{ path: 'email' }])
  })
})

describe('a password reset', () => {
  it('ends all sessions, replaces the password, and its link works once', async () => {
    const { client, user } = await api.signInAs('publisher')
    expect((await api.anonymous().call(requestPasswordReset, { body: { email: user.email } })).status).toBe(
      204,
    )
    const token = await lastLinkTo(user.email)
    const body = { token, password: 'a brand new password' }
    expect((await api.anonymous().call(resetPassword, { body })).status).toBe(204)
    expect((await client.problem(getSession)).status).toBe(401)
    expect((await api.anonymous().problem(resetPassword, { body })).code).toBe('link-expired')
    const attempt = (password: string) =>
      api.anonymous().call(signIn, { body: { email: user.email, password } })
    expect((await attempt(TEST_PASSWORD)).status).toBe(401)
    expect((await attempt('a brand new password')).status).toBe(200)
  })

  it('for an unknown address answers the same and sends nothing', async () => {
    const answer = await api.anonymous().call(requestPasswordReset, { body: { email: 'nobody@example.org' } })
    expect(answer.status).toBe(204)
    expect(await lastLinkTo('nobody@example.org')).toBe('')
  })

  it('link does not open an invitation', async () => {
    const user = await api.createUser('clerk')
    await api.anonymous().call(requestPasswordReset, { body: { email: user.email } })
    const token = await lastLinkTo(user.email)
    expect((await api.anonymous().problem(readInvitation, { body: { token } })).code).toBe('link-expired')
  })

  it('works no longer once the person has changed the password themselves', async () => {
    const { client, user } = await api.signInAs('clerk')
    await api.anonymous().call(requestPasswordReset, { body: { email: user.email } })
    const token = await lastLinkTo(user.email)
    const passwords = { currentPassword: TEST_PASSWORD, newPassword: 'a password of my choice' }
    expect((await client.call(changePassword, { body: passwords })).status).toBe(204)
    const body = { token, password: 'a password of another' }
    expect((await api.anonymous().problem(resetPassword, { body })).code).toBe('link-expired')
  })
})
