import { getStation, listStations, refreshSession, signIn, signOut, uploadLog } from '@fieldfare/contracts'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import {
  createFakeServer,
  emptyAnswer,
  jsonAnswer,
  problemAnswer,
  type FakeServer,
} from '../testing/fake-server.ts'
import { sessionOf } from '../testing/session-fixture.ts'
import { callApi } from './api-client.ts'
import { ApiProblem } from './api-problem.ts'
import { endpointAddress } from './endpoint-address.ts'
import { onSessionEnd } from './session-refresh.ts'

let server: FakeServer

beforeEach(() => {
  server = createFakeServer()
  document.cookie = 'fieldfare_csrf=token-1'
})
afterEach(() => {
  document.cookie = 'fieldfare_csrf=; expires=Thu, 01 Jan 1970 00:00:00 GMT'
})

async function problemOf(call: Promise<unknown>): Promise<ApiProblem> {
  const outcome = await call.catch((error: unknown) => error)
  if (outcome instanceof ApiProblem) return outcome
  throw new Error('The call was expected to fail with a problem')
}

/** Stations answer only once the session was renewed. */
function expireSession(): void {
  let isRenewed = false
  server.handle(listStations, () => (isRenewed ? jsonAnswer({ items: [] }) : problemAnswer('not-signed-in')))
  server.handle(refreshSession, () => {
    isRenewed = true
    return jsonAnswer(sessionOf('clerk'))
  })
}

describe('callApi', () => {
  it('gives the parsed answer', async () => {
    server.answer(listStations, { items: [] })

    await expect(callApi(listStations)).resolves.toEqual({ items: [] })
  })

  it('repeats the CSRF cookie in the header of a request that changes something', async () => {
    server.handle(signOut, emptyAnswer)

    await callApi(signOut)

    expect(server.requestsTo(signOut)[0]?.headers.get('x-csrf-token')).toBe('token-1')
  })

  it('throws the problem of a refusal with its field errors', async () => {
    const fieldErrors = [{ path: 'email', message: 'Enter an e-mail address.' }]
    server.handle(signIn, () => problemAnswer('validation-failed', { fieldErrors }))

    const problem = await problemOf(callApi(signIn, { body: { email: 'x', password: 'y' } }))

    expect(problem.code).toBe('validation-failed')
    expect(problem.fieldErrors).toEqual(fieldErrors)
  })

  it('says there is no connection when no answer comes', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')))

    const problem = await problemOf(callApi(listStations))

    expect(problem.code).toBe('unavailable')
    expect(problem.problem.status).toBe(0)
  })

  it('takes a page of a proxy for an unready service', async () => {
    server.handle(listStations, () => new Response('<html>Bad gateway</html>', { status: 502 }))

    expect((await problemOf(callApi(listStations))).code).toBe('unavailable')
  })

  it('refuses an answer that breaks the contract', async () => {
    server.handle(listStations, () => jsonAnswer({ items: [{ id: 'not a station' }] }))

    expect((await problemOf(callApi(listStations))).problem.title).toBe('The answer could not be read')
  })
})

describe('a session that has run out', () => {
  it('is renewed once for several requests at the same time, which then succeed', async () => {
    expireSession()

    const answers = await Promise.all([callApi(listStations), callApi(listStations), callApi(listStations)])

    expect(answers).toEqual([{ items: [] }, { items: [] }, { items: [] }])
    expect(server.requestsTo(refreshSession)).toHaveLength(1)
  })

  it('that cannot be renewed is announced, and the request is not sent again', async () => {
    server.handle(listStations, () => problemAnswer('not-signed-in'))
    server.handle(refreshSession, () => problemAnswer('not-signed-in'))
    const listener = vi.fn()
    const stop = onSessionEnd(listener)

    const problem = await problemOf(callApi(listStations))
    stop()

    expect(problem.code).toBe('not-signed-in')
    expect(listener).toHaveBeenCalledOnce()
    expect(server.requestsTo(listStations)).toHaveLength(1)
  })

  it.each([
    ['does not answer', () => Promise.reject(new TypeError('Failed to fetch'))],
    ['is not ready', () => Promise.resolve(new Response('<html>Bad gateway</html>', { status: 502 }))],
  ])('is not over because the service %s when it is renewed', async (_what, renew) => {
    vi.stubGlobal('fetch', (address: string) =>
      address === refreshSession.path ? renew() : Promise.resolve(problemAnswer('not-signed-in')),
    )
    const listener = vi.fn()
    const stop = onSessionEnd(listener)

    const problem = await problemOf(callApi(listStations))
    stop()

    expect(problem.code).toBe('unavailable')
    expect(listener).not.toHaveBeenCalled()
  })

  it('is not looked for behind a wrong password', async () => {
    server.handle(signIn, () => problemAnswer('sign-in-failed'))

    const problem = await problemOf(callApi(signIn, { body: { email: 'a@example.org', password: 'wrong' } }))

    expect(problem.code).toBe('sign-in-failed')
    expect(server.requestsTo(refreshSession)).toHaveLength(0)
  })
})

describe('endpointAddress', () => {
  it('fills in parameters, escaped, and leaves empty query values out', () => {
    const address = endpointAddress(getStation, {
      params: { stationId: 'a/b' },
      query: { search: 'low tide', page: 2, status: '', month: undefined },
    })

    expect(address).toBe('/api/stations/a%2Fb?search=low+tide&page=2')
  })

  it('refuses a path with a missing parameter', () => {
    expect(() => endpointAddress(uploadLog, {})).toThrow('uploadLog needs the parameter stationId')
  })
})
