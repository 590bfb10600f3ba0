import type { Endpoint, EndpointResult, Problem, ProblemCode } from '@fieldfare/contracts'
import { problemKinds } from '@fieldfare/contracts'
import { vi } from 'vitest'

export type FakeRequest = { method: string; url: URL; headers: Headers; body: unknown }
export type FakeHandler = (request: FakeRequest) => Response | Promise<Response>

export function jsonAnswer(body: unknown, status = 200): Response {
  return new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/json' } })
}

export function emptyAnswer(): Response {
  return new Response(null, { status: 204 })
}

export function problemAnswer(code: ProblemCode, extra: Partial<Problem> = {}): Response {
  const { status, title } = problemKinds[code]
  return new Response(
    JSON.stringify({
      type: 'about:blank',
      code,
      title,
      status,
      detail: title,
      correlationId: 'test',
      fieldErrors: [],
      ...extra,
    }),
    { status, headers: { 'content-type': 'application/problem+json' } },
  )
}

function pathPattern(endpoint: Endpoint): RegExp {
  return new RegExp(`^${endpoint.path.replaceAll('.', '\\.').replace(/:[A-Za-z]+/g, '[^/]+')}$`)
}

/** Stands in for the API: answers fetch by endpoint and remembers what was asked. Unknown requests fail the test. */
export function createFakeServer() {
  const routes: { endpoint: Endpoint; handle: FakeHandler }[] = []
  const requests: FakeRequest[] = []

  const answer = async (input: RequestInfo | URL, init: RequestInit = {}): Promise<Response> => {
    const address = input instanceof Request ? input.url : String(input)
    const request: FakeRequest = {
      method: init.method ?? 'GET',
      url: new URL(address, window.location.origin),
      headers: new Headers(init.headers),
      body: typeof init.body === 'string' ? JSON.parse(init.body) : undefined,
    }
    requests.push(request)
    const route = routes.findLast(
      ({ endpoint }) =>
        endpoint.method === request.method && pathPattern(endpoint).test(request.url.pathname),
    )
    if (route === undefined)
      throw new Error(`No answer prepared for ${request.method} ${request.url.pathname}`)
    return route.handle(request)
  }
  vi.stubGlobal('fetch', vi.fn(answer))

  return {
    requests,
    /** Answers an endpoint with a handler; the last one given wins. */
    handle(endpoint: Endpoint, handle: FakeHandler): void {
      routes.push({ endpoint, handle })
    },
    /** Answers an endpoint with a body of the contract's type. */
    answer<E extends Endpoint>(endpoint: E, body: EndpointResult<E>): void {
      routes.push({ endpoint, handle: () => (body === undefined ? emptyAnswer() : jsonAnswer(body)) })
    },
    /** What was asked of an endpoint so far. */
    requestsTo(endpoint: Endpoint): FakeRequest[] {
      return requests.filter(
        ({ method, url }) => method === endpoint.method && pathPattern(endpoint).test(url.pathname),
      )
    },
  }
}

export type FakeServer = ReturnType<typeof createFakeServer>
