import assert from 'node:assert/strict'
import {
  fieldErrorsFrom,
  type Endpoint,
  type EndpointBody,
  type EndpointParams,
  type EndpointQuery,
  type EndpointResult,
  type FieldError,
  type SessionId,
} from '@fieldfare/contracts'
import { scopeOf, type Actor, type Scope } from '@fieldfare/database'
import { Router, type Request, type Response } from 'express'
import type { Logger } from 'pino'
import type { z } from 'zod'
import { AppError, validationFailed } from './app-error.ts'
import { cookieJar, type CookieJar } from './cookie-jar.ts'
import { openEventStream, type EventStream } from './event-stream.ts'
import { sendFile, type FileAnswer } from './file-answer.ts'
import { readJsonBody } from './json-body.ts'
import { requestContext, type RequestContext, type SignedIn } from './request-context.ts'
import { discardUpload, receiveUpload, type UploadedFile } from './upload.ts'

export type RequestMeta = {
  correlationId: string
  logger: Logger
  ip: string
  userAgent: string
  /** Aborted when the viewer leaves before the answer is complete. */
  signal: AbortSignal
}

type Identity<E extends Endpoint> = E['access'] extends 'public'
  ? { actor: null; sessionId: null; scope: null }
  : { actor: Actor; sessionId: SessionId; scope: Scope }

/** What a handler gets: parsed, checked and free of Express. */
export type HandlerInput<E extends Endpoint> = Identity<E> & {
  params: EndpointParams<E>
  query: EndpointQuery<E>
  body: EndpointBody<E>
  file: E extends { file: object } ? UploadedFile : null
  meta: RequestMeta
  cookies: CookieJar
}

/** What a handler answers, by the kind of answer its endpoint declares. */
export type HandlerResult<E extends Endpoint> = E['answer'] extends { kind: 'file' }
  ? FileAnswer
  : E['answer'] extends { kind: 'events' }
    ? (stream: EventStream) => void
    : E['answer'] extends { kind: 'json' }
      ? EndpointResult<E>
      : // eslint-disable-next-line @typescript-eslint/no-invalid-void-type -- a handler without an answer just ends
        void

export type Handler<E extends Endpoint> = (input: HandlerInput<E>) => Promise<HandlerResult<E>>

type LooseInput = {
  actor: Actor | null
  sessionId: SessionId | null
  scope: Scope | null
  params: unknown
  query: unknown
  body: unknown
  file: UploadedFile | null
  meta: RequestMeta
  cookies: CookieJar
}

const SAFE_METHODS: readonly Endpoint['method'][] = ['GET']

async function authorise(endpoint: Endpoint, context: RequestContext): Promise<SignedIn | null> {
  const isUnsafe = !SAFE_METHODS.includes(endpoint.method)
  if (isUnsafe) context.checkOrigin()
  if (endpoint.access === 'public') return null
  const signedIn = await context.signedIn()
  if (signedIn === null) throw new AppError('not-signed-in', { detail: 'Sign in to go on.' })
  const { role } = signedIn.actor
  if (endpoint.access !== 'signed-in' && !endpoint.access.includes(role)) {
    throw new AppError('not-allowed', { detail: 'Your role does not include this.' })
  }
  if (isUnsafe) context.checkCsrf(signedIn.sessionId)
  return signedIn
}

function collect(schema: z.ZodType | undefined, value: unknown, errors: FieldError[]): unknown {
  if (schema === undefined) return undefined
  const parsed = schema.safeParse(value)
  if (parsed.success) return parsed.data
  errors.push(...fieldErrorsFrom(parsed.error))
  return undefined
}

/** Checks all parts before complaining, since a form needs every complaint at once. */
function parseParts(endpoint: Endpoint, request: Request, file: UploadedFile | null) {
  const errors: FieldError[] = []
  if (endpoint.file !== undefined && file === null) {
    errors.push({ path: endpoint.file.field, message: 'Choose a file.' })
  }
  const body: unknown = request.body ?? {}
  const parts = {
    params: collect(endpoint.params, request.params, errors),
    query: collect(endpoint.query, request.query, errors),
    body: collect(endpoint.body, body, errors),
  }
  if (errors.length > 0) throw validationFailed(errors)
  return parts
}

function metaOf(request: Request, response: Response, context: RequestContext): RequestMeta {
  const abort = new AbortController()
  response.on('close', () => abort.abort())
  return {
    correlationId: context.correlationId,
    logger: context.logger,
    ip: request.ip ?? 'unknown',
    userAgent: request.get('user-agent') ?? '',
    signal: abort.signal,
  }
}

/** The types of a handler's input follow from its endpoint; this is where what was found meets what was promised. */
function assertInputOf<E extends Endpoint>(
  endpoint: E,
  input: LooseInput,
): asserts input is LooseInput & HandlerInput<E> {
  assert(
    (endpoint.access === 'public') === (input.actor === null),
    `${endpoint.id}: actor and access disagree`,
  )
  assert(
    (endpoint.file === undefined) === (input.file === null),
    `${endpoint.id}: file and declaration disagree`,
  )
}

function isFileAnswer(result: unknown): result is FileAnswer {
  return typeof result === 'object' && result !== null && 'mediaType' in result && 'content' in result
}

function isStreamListener(result: unknown): result is (stream: EventStream) => void {
  return typeof result === 'function'
}

async function respond(
  endpoint: Endpoint,
  result: unknown,
  request: Request,
  response: Response,
): Promise<void> {
  switch (endpoint.answer.kind) {
    case 'json': {
      const answer = endpoint.answer.schema.safeParse(result)
      if (!answer.success) {
        throw new Error(`${endpoint.id} answered something its contract does not know`, {
          cause: answer.error,
        })
      }
      response.status(200).setHeader('cache-control', 'no-store')
      response.json(answer.data)
      return
    }
    case 'empty':
      response.status(204).setHeader('cache-control', 'no-store')
      response.end()
      return
    case 'file':
      if (!isFileAnswer(result)) throw new Error(`${endpoint.id} answered no file`)
      await sendFile(result, request, response)
      return
    case 'events':
      if (!isStreamListener(result)) throw new Error(`${endpoint.id} answered nothing that listens`)
      result(openEventStream(request, response))
      return
  }
}

/**
 * One endpoint of the contracts as a router: who may call, whether the request came from our own pages, what it
 * carries, then the handler, then its answer cut down to what the contract names. Use it with `router.use(…)`.
 */
export function route<E extends Endpoint>(endpoint: E, handler: Handler<E>): Router {
  async function handle(request: Request, response: Response): Promise<void> {
    const context = requestContext(request)
    const signedIn = await authorise(endpoint, context)
    let file: UploadedFile | null = null
    try {
      if (endpoint.file !== undefined) {
        file = await receiveUpload(request, response, {
          field: endpoint.file.field,
          directory: context.uploadDirectory,
          limitBytes: context.uploadLimitBytes,
        })
      } else if (endpoint.body !== undefined) await readJsonBody(request, response)
      const parts = parseParts(endpoint, request, file)
      const input: LooseInput = {
        actor: signedIn?.actor ?? null,
        sessionId: signedIn?.sessionId ?? null,
        scope: signedIn === null ? null : scopeOf(signedIn.actor),
        ...parts,
        file,
        meta: metaOf(request, response, context),
        cookies: cookieJar(request, response),
      }
      assertInputOf(endpoint, input)
      const result: unknown = await handler(input)
      await respond(endpoint, result, request, response)
    } finally {
      await discardUpload(file)
    }
  }
  const router = Router({ caseSensitive: true })
  const method = endpoint.method.toLowerCase()
  switch (method) {
    case 'get':
    case 'post':
    case 'put':
    case 'patch':
    case 'delete':
      router[method](endpoint.path, handle)
      break
    default:
      throw new Error(`No route takes the method ${endpoint.method}`)
  }
  return router
}
