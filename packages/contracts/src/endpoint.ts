import type { z } from 'zod'
import type { Role } from './roles.ts'

/** Who may call: anyone, anyone signed in, or the listed roles. Row scope comes on top, in the repositories. */
export type EndpointAccess = 'public' | 'signed-in' | readonly Role[]

/** A file answer names its media types; 'empty' is 204; 'events' is a text/event-stream of the schema. */
export type EndpointAnswer =
  | { kind: 'json'; schema: z.ZodType }
  | { kind: 'empty' }
  | { kind: 'file'; mediaTypes: readonly string[] }
  | { kind: 'events'; schema: z.ZodType }

export type Endpoint = {
  id: string
  method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'
  /** Express path with named parameters. */
  path: `/api/${string}`
  tag: string
  summary: string
  access: EndpointAccess
  params?: z.ZodObject
  query?: z.ZodObject
  body?: z.ZodType
  /** The request is multipart/form-data: `body` describes the text fields, this names the file field. */
  file?: { field: string; description: string }
  answer: EndpointAnswer
}

/** Declares an endpoint once for server, client, documentation and the access tests. */
export function defineEndpoint<const Definition extends Endpoint>(definition: Definition): Definition {
  return definition
}

export type EndpointParams<E extends Endpoint> = E extends { params: infer Schema extends z.ZodObject }
  ? z.output<Schema>
  : undefined
export type EndpointQuery<E extends Endpoint> = E extends { query: infer Schema extends z.ZodObject }
  ? z.output<Schema>
  : undefined
export type EndpointBody<E extends Endpoint> = E extends { body: infer Schema extends z.ZodType }
  ? z.output<Schema>
  : undefined

/** What a handler returns, before the answer schema picks the fields that may leave the server. */
export type EndpointResult<E extends Endpoint> = E['answer'] extends {
  kind: 'json'
  schema: infer Schema extends z.ZodType
}
  ? z.input<Schema>
  : undefined

/** What a client receives after parsing. */
export type EndpointOutput<E extends Endpoint> = E['answer'] extends {
  kind: 'json'
  schema: infer Schema extends z.ZodType
}
  ? z.output<Schema>
  : undefined
