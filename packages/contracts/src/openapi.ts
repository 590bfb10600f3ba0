import { z } from 'zod'
import type { Endpoint } from './endpoint.ts'
import { endpoints } from './endpoints.ts'
import { problemSchema } from './problem.ts'

type JsonObject = { [key: string]: unknown }

function jsonSchema(schema: z.ZodType, io: 'input' | 'output'): JsonObject {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' })
  return rest
}

function child(value: unknown, name: string): unknown {
  return typeof value === 'object' && value !== null ? Reflect.get(value, name) : undefined
}

function parameters(place: 'path' | 'query', schema: z.ZodObject | undefined): JsonObject[] {
  if (!schema) return []
  const described = jsonSchema(schema, 'input')
  const required: unknown = described['required']
  return Object.keys(schema.shape).map((name) => ({
    name,
    in: place,
    required: place === 'path' || (Array.isArray(required) && required.includes(name)),
    schema: child(described['properties'], name),
  }))
}

function requestBody(endpoint: Endpoint): JsonObject | undefined {
  if (endpoint.file) {
    const fields = endpoint.body ? jsonSchema(endpoint.body, 'input') : { type: 'object' }
    const properties = typeof fields['properties'] === 'object' ? fields['properties'] : {}
    const file = { type: 'string', format: 'binary', description: endpoint.file.description }
    const schema = { ...fields, properties: { ...properties, [endpoint.file.field]: file } }
    return { required: true, content: { 'multipart/form-data': { schema } } }
  }
  if (!endpoint.body) return undefined
  return { required: true, content: { 'application/json': { schema: jsonSchema(endpoint.body, 'input') } } }
}

function successAnswer(endpoint: Endpoint): JsonObject {
  switch (endpoint.answer.kind) {
    case 'json':
      return {
        '200': {
          description: endpoint.summary,
          content: { 'application/json': { schema: jsonSchema(endpoint.answer.schema, 'output') } },
        },
      }
    case 'empty':
      return { '204': { description: 'Done' } }
    case 'file':
      return {
        '200': {
          description: endpoint.summary,
          content: Object.fromEntries(endpoint.answer.mediaTypes.map((type) => [type, {}])),
        },
      }
    case 'events':
      return {
        '200': {
          description: 'Each event carries one JSON document of this schema',
          content: { 'text/event-stream': { schema: jsonSchema(endpoint.answer.schema, 'output') } },
        },
      }
  }
}

function describeAccess(endpoint: Endpoint): string {
  if (endpoint.access === 'public') return 'Open to everyone.'
  if (endpoint.access === 'signed-in') return 'Open to everyone signed in.'
  return `Open to: ${endpoint.access.join(', ')}.`
}

const problemAnswer = {
  description: 'A problem document (RFC 9457)',
  content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } },
}

function operation(endpoint: Endpoint): JsonObject {
  const body = requestBody(endpoint)
  return {
    operationId: endpoint.id,
    tags: [endpoint.tag],
    summary: endpoint.summary,
    description: describeAccess(endpoint),
    parameters: [...parameters('path', endpoint.params), ...parameters('query', endpoint.query)],
    ...(body ? { requestBody: body } : {}),
    responses: { ...successAnswer(endpoint), default: problemAnswer },
    ...(endpoint.access === 'public' ? { security: [] } : {}),
  }
}

/** The whole interface as an OpenAPI 3.1 document, made from the same schemas the server checks with. */
export function buildOpenApiDocument(): JsonObject {
  const paths: Record<string, JsonObject> = {}
  for (const endpoint of endpoints) {
    const path = endpoint.path.replace(/:([A-Za-z]+)/g, '{$1}')
    paths[path] = { ...paths[path], [endpoint.method.toLowerCase()]: operation(endpoint) }
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Fieldfare',
      version: '0.1.0',
      description:
        'Amounts are whole numbers of minor units as strings; instants are UTC; unsafe methods need the x-csrf-token header.',
    },
    paths,
    components: {
      schemas: { Problem: jsonSchema(problemSchema, 'output') },
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'fieldfare_access' } },
    },
    security: [{ session: [] }],
  }
}
