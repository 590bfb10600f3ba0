import { signIn } from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { startTestApi, TEST_PASSWORD, type TestApi } from '../support/test-api.ts'

let api: TestApi

beforeAll(async () => {
  api = await startTestApi()
})

describe('guessing a password', () => {
  it('answers a wrong password and an unknown address alike, and stops after five attempts', async () => {
    const user = await api.createUser('clerk')
    const attempt = (email: string, password: string) =>
      api.anonymous().problem(signIn, { body: { email, password } })
    const wrong = await attempt(user.email, 'wrong password')
    const unknown = await attempt('nobody@example.org', 'wrong password')
    expect({ ...wrong, correlationId: '' }).toEqual({ ...unknown, correlationId: '' })
    for (let count = 2; count <= 5; count += 1) await attempt(user.email, 'wrong password')
    const response = await api
      .anonymous()
      .fetch(signIn, { body: { email: user.email, password: TEST_PASSWORD } })
    expect(response.status).toBe(429)
    expect(Number(response.headers.get('retry-after'))).toBeGreaterThan(0)
    const other = await api.createUser('clerk')
    const answer = await api
      .anonymous()
      .call(signIn, { body: { email: other.email, password: TEST_PASSWORD } })
    expect(answer.status).toBe(200)
  })

  it('takes as long for an unknown address as for a known one', async () => {
    const user = await api.createUser('clerk')
    const measure = async (email: string): Promise<number> => {
      const start = performance.now()
      await api.anonymous().call(signIn, { body: { email, password: 'wrong password' } })
      return performance.now() - start
    }
    const known = Math.min(await measure(user.email), await measure(user.email), await measure(user.email))
    const unknown = Math.min(
      await measure('a@example.org'),
      await measure('b@example.org'),
      await measure('c@example.org'),
    )
    // Without the hash an unknown address answers in a few milliseconds, a hundredth of the time.
    expect(unknown).toBeGreaterThan(known / 3)
  })

  it('refuses disabled people', async () => {
    const user = await api.createUser('clerk')
    await api.database('users').where({ id: user.userId }).update({ status: 'disabled' })
    const problem = await api
      .anonymous()
      .problem(signIn, { body: { email: user.email, password: TEST_PASSWORD } })
    expect(problem.code).toBe('sign-in-failed')
  })
})
