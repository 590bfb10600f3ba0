import { endpoints, problemSchema, roles, type Endpoint, type Problem } from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { z } from 'zod'
import { NO_SUCH_ADDRESS } from '../../apps/api/src/middleware/no-such-address.ts'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'

/** Values that every path parameter's schema accepts and no row has. */
const PARAMETER_CANDIDATES = [
  '00000000-0000-4000-8000-000000000000',
  '2026-11',
  '2026-11-29',
  'log',
  'reference',
  'original',
  '1',
]

let api: TestApi

beforeAll(async () => {
  api = await startTestApi()
})

function dummyParams(endpoint: Endpoint): Record<string, string> {
  const shape = endpoint.params?.shape ?? {}
  return Object.fromEntries(
    Object.entries(shape).map(([name, schema]) => {
      const value = PARAMETER_CANDIDATES.find((candidate) => z.safeParse(schema, candidate).success)
      if (value === undefined)
        throw new Error(`${endpoint.id}: add a value that :${name} accepts to the candidates`)
      return [name, value]
    }),
  )
}

/** Calls without a body that could do anything, and leaves streams as soon as they answer. */
async function probe(
  endpoint: Endpoint,
  client: TestClient,
): Promise<{ status: number; problem: Problem | null }> {
  const leave = new AbortController()
  const response = await client.fetch(endpoint, {
    params: dummyParams(endpoint),
    signal: leave.signal,
    ...(endpoint.file === undefined && endpoint.body !== undefined ? { body: {} } : {}),
    ...(endpoint.file === undefined ? {} : { form: new FormData() }),
  })
  const isProblem = response.headers.get('content-type')?.startsWith('application/problem+json') === true
  const problem = isProblem ? problemSchema.parse(await response.json()) : null
  leave.abort()
  return { status: response.status, problem }
}

describe.each(endpoints)('$id ($method $path)', (endpoint) => {
  it('is mounted by a feature', async () => {
    const { client } = await api.signInAs('admin')
    const { problem } = await probe(endpoint, client)
    expect(problem?.detail).not.toBe(NO_SUCH_ADDRESS)
    expect(problem?.code).not.toBe('method-not-allowed')
    expect(problem?.code).not.toBe('internal-error')
  })

  it('is open to strangers only where it is public', async () => {
    const { status, problem } = await probe(endpoint, api.anonymous())
    if (endpoint.access !== 'public') expect(problem).toMatchObject({ status: 401, code: 'not-signed-in' })
    // Exchanging a refresh token needs one, which a stranger has not.
    else if (endpoint.id !== 'refreshSession') expect([401, 403]).not.toContain(status)
  })

  it.each(roles)('treats the role %s as the contract says', async (role) => {
    const { client } = await api.signInAs(role)
    const { status, problem } = await probe(endpoint, client)
    const isAllowed = typeof endpoint.access === 'string' || endpoint.access.includes(role)
    if (!isAllowed) expect(problem).toMatchObject({ status: 403, code: 'not-allowed' })
    else if (endpoint.id !== 'refreshSession') {
      expect(status).not.toBe(401)
      expect(problem?.code).not.toBe('not-allowed')
      expect(problem?.code).not.toBe('internal-error')
    }
  })
})

describe('the walk', () => {
  it('covers the whole registry, each endpoint once', () => {
    expect(endpoints.length).toBeGreaterThan(50)
    expect(new Set(endpoints.map((endpoint) => `${endpoint.method} ${endpoint.path}`)).size).toBe(
      endpoints.length,
    )
  })

  it('would notice an address that nobody answers', async () => {
    const { client } = await api.signInAs('admin')
    const nowhere: Endpoint = {
      id: 'nowhere',
      method: 'GET',
      path: '/api/nowhere',
      tag: 'Test',
      summary: 'Not mounted',
      access: 'signed-in',
      answer: { kind: 'empty' },
    }
    expect(await client.problem(nowhere)).toMatchObject({ status: 404, detail: NO_SUCH_ADDRESS })
  })

  it('answers 405 with the methods an address does take', async () => {
    const { client } = await api.signInAs('admin')
    const response = await fetch(`${api.url}/api/auth/session`, { method: 'PUT' })
    expect(response.status).toBe(405)
    expect(response.headers.get('allow')).toBe('GET')
    expect(client.cookies.size).toBe(2)
  })
})
