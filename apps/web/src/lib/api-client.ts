import type { Endpoint, EndpointOutput } from '@fieldfare/contracts'
import type { z } from 'zod'
import { ApiProblem, connectionProblem, problemFromAnswer } from './api-problem.ts'
import { csrfHeader } from './csrf.ts'
import { endpointAddress, type AddressOptions, type LooseAddress } from './endpoint-address.ts'
import { announceSessionEnd, refreshOnce } from './session-refresh.ts'

export type CallBody<E extends Endpoint> = E extends { body: infer Schema extends z.ZodType }
  ? { body: z.input<Schema> }
  : { body?: undefined }

export type CallOptions<E extends Endpoint> = AddressOptions<E> & CallBody<E> & { signal?: AbortSignal }

type LooseCall = LooseAddress & { body?: unknown; signal?: AbortSignal }

/** The options may be left out where the endpoint needs none. */
export type CallArguments<E extends Endpoint> =
  object extends CallOptions<E> ? [options?: CallOptions<E>] : [options: CallOptions<E>]

/**
 * Calls an endpoint and gives its parsed answer. Renews the session once when it has run out.
 * @throws ApiProblem for every failure except a cancelled request.
 */
export function callApi<E extends Endpoint>(
  endpoint: E,
  ...options: CallArguments<E>
): Promise<EndpointOutput<E>>
export async function callApi(endpoint: Endpoint, options: LooseCall = {}): Promise<unknown> {
  let answer = await send(endpoint, options)
  if (await isSessionOver(endpoint, answer)) {
    if (await refreshOnce()) answer = await send(endpoint, options)
    if (answer.status === 401) announceSessionEnd()
  }
  const body = await readBody(answer)
  if (!answer.ok) throw problemFromAnswer(answer.status, body)
  return endpoint.answer.kind === 'json' ? parseAnswer(endpoint, endpoint.answer.schema, body) : undefined
}

async function send(endpoint: Endpoint, options: LooseCall): Promise<Response> {
  const request: RequestInit = {
    method: endpoint.method,
    credentials: 'same-origin',
    headers: {
      accept: 'application/json, application/problem+json',
      ...(endpoint.method === 'GET' ? {} : csrfHeader()),
      ...(options.body === undefined ? {} : { 'content-type': 'application/json' }),
    },
    ...(options.body === undefined ? {} : { body: JSON.stringify(options.body) }),
    ...(options.signal === undefined ? {} : { signal: options.signal }),
  }
  try {
    return await fetch(endpointAddress(endpoint, options), request)
  } catch (error) {
    if (options.signal?.aborted === true) throw error
    throw connectionProblem()
  }
}

/** A 401 of a public endpoint, such as a wrong password at sign-in, is an answer and not a lost session. */
async function isSessionOver(endpoint: Endpoint, answer: Response): Promise<boolean> {
  if (answer.status !== 401 || endpoint.access === 'public') return false
  const body = await readBody(answer.clone())
  return problemFromAnswer(answer.status, body).code !== 'sign-in-failed'
}

async function readBody(answer: Response): Promise<unknown> {
  const text = await answer.text()
  if (text === '') return undefined
  try {
    return JSON.parse(text)
  } catch {
    // Not JSON: the caller turns it into a problem or fails on the schema, in words.
    return text
  }
}

export function parseAnswer(endpoint: Endpoint, schema: z.ZodType, body: unknown): unknown {
  const reading = schema.safeParse(body)
  if (reading.success) return reading.data
  throw new ApiProblem({
    type: 'about:blank',
    code: 'internal-error',
    title: 'The answer could not be read',
    status: 0,
    detail: 'The service answered in a form this page does not know. Load the page again.',
    correlationId: `${endpoint.id}: ${reading.error.issues[0]?.path.map(String).join('.') ?? ''}`,
    fieldErrors: [],
  })
}
