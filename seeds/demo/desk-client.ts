import { problemSchema, type Endpoint, type Problem } from '@fieldfare/contracts'
import type { z } from 'zod'

export type CallParts = {
  params?: Record<string, string>
  query?: Record<string, string>
  body?: unknown
  form?: FormData
  headers?: Record<string, string>
  signal?: AbortSignal
}

export type JsonEndpoint<Schema extends z.ZodType> = Endpoint & { answer: { kind: 'json'; schema: Schema } }

export type Answer = { status: number; headers: Headers; text: string }

/** A browser in small, for scripts and tests: keeps cookies and repeats the CSRF cookie as a header. */
export class DeskClient {
  readonly cookies = new Map<string, string>()
  readonly url: string

  constructor(url: string) {
    this.url = url
  }

  /** The raw answer, whatever its status. */
  async call(endpoint: Endpoint, parts: CallParts = {}): Promise<Answer> {
    const response = await this.fetch(endpoint, parts)
    return { status: response.status, headers: response.headers, text: await response.text() }
  }

  /** The answer, parsed by its contract; fails on every other status than 200. */
  async json<Schema extends z.ZodType>(
    endpoint: JsonEndpoint<Schema>,
    parts: CallParts = {},
  ): Promise<z.output<Schema>> {
    const answer = await this.call(endpoint, parts)
    if (answer.status !== 200) throw new Error(`${endpoint.id} answered ${answer.status}: ${answer.text}`)
    return endpoint.answer.schema.parse(JSON.parse(answer.text))
  }

  /** The problem document; fails when the call went well. */
  async problem(endpoint: Endpoint, parts: CallParts = {}): Promise<Problem> {
    const answer = await this.call(endpoint, parts)
    if (answer.status < 400) throw new Error(`${endpoint.id} went well: ${answer.text}`)
    return problemSchema.parse(JSON.parse(answer.text))
  }

  /** The response itself, its body unread, for streams. */
  async fetch(endpoint: Endpoint, parts: CallParts = {}): Promise<Response> {
    const { params = {}, query = {} } = parts
    const path = endpoint.path.replaceAll(/:([A-Za-z]+)/g, (_match, name: string) =>
      encodeURIComponent(params[name] ?? ''),
    )
    const search = new URLSearchParams(query).toString()
    const response = await fetch(`${this.url}${path}${search === '' ? '' : `?${search}`}`, {
      method: endpoint.method,
      redirect: 'manual',
      headers: { ...this.#headers(endpoint, parts), ...parts.headers },
      ...(parts.form === undefined ? {} : { body: parts.form }),
      ...(parts.body === undefined ? {} : { body: JSON.stringify(parts.body) }),
      ...(parts.signal === undefined ? {} : { signal: parts.signal }),
    })
    this.#keepCookies(response)
    return response
  }

  #headers(endpoint: Endpoint, parts: CallParts): Record<string, string> {
    const csrf = this.cookies.get('fieldfare_csrf')
    const cookie = [...this.cookies].map(([name, value]) => `${name}=${encodeURIComponent(value)}`).join('; ')
    return {
      ...(cookie === '' ? {} : { cookie }),
      ...(endpoint.method === 'GET' || csrf === undefined ? {} : { 'x-csrf-token': csrf }),
      ...(parts.body === undefined ? {} : { 'content-type': 'application/json' }),
    }
  }

  #keepCookies(response: Response): void {
    for (const line of response.headers.getSetCookie()) {
      const [pair = ''] = line.split(';')
      const at = pair.indexOf('=')
      const [name, value] = [pair.slice(0, at), decodeURIComponent(pair.slice(at + 1))]
      if (value === '') this.cookies.delete(name)
      else this.cookies.set(name, value)
    }
  }
}
