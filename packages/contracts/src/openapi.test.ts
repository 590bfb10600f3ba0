import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { endpoints } from './endpoints.ts'
import { buildOpenApiDocument } from './openapi.ts'

const operationSchema = z.object({
  operationId: z.string(),
  parameters: z.array(z.object({ name: z.string(), in: z.string(), required: z.boolean() })),
  requestBody: z
    .object({
      content: z.record(
        z.string(),
        z.object({ schema: z.object({ properties: z.record(z.string(), z.unknown()).optional() }) }),
      ),
    })
    .optional(),
  responses: z.record(z.string(), z.object({ content: z.record(z.string(), z.unknown()).optional() })),
})

const document = z
  .object({ paths: z.record(z.string(), z.record(z.string(), operationSchema)) })
  .parse(JSON.parse(JSON.stringify(buildOpenApiDocument())))

function operation(path: string, method: string) {
  const found = document.paths[path]?.[method]
  if (!found) throw new Error(`${method} ${path} is not described`)
  return found
}

describe('the endpoint registry', () => {
  it('has one endpoint per id and per method and path', () => {
    expect(new Set(endpoints.map((endpoint) => endpoint.id)).size).toBe(endpoints.length)
    expect(new Set(endpoints.map((endpoint) => `${endpoint.method} ${endpoint.path}`)).size).toBe(
      endpoints.length,
    )
  })

  it('names every path parameter in its schema and no other', () => {
    for (const endpoint of endpoints) {
      const inPath = [...endpoint.path.matchAll(/:([A-Za-z]+)/g)].map((match) => match[1])
      expect([endpoint.id, ...Object.keys(endpoint.params?.shape ?? {})]).toEqual([endpoint.id, ...inPath])
    }
  })
})

describe('the OpenAPI document', () => {
  it('describes every endpoint with its answers', () => {
    for (const endpoint of endpoints) {
      const path = endpoint.path.replace(/:([A-Za-z]+)/g, '{$1}')
      const { operationId, responses } = operation(path, endpoint.method.toLowerCase())
      expect(operationId).toBe(endpoint.id)
      expect(Object.keys(responses['default']?.content ?? {})).toEqual(['application/problem+json'])
    }
  })

  it('marks a parameter with a default as optional and a path parameter as required', () => {
    const { parameters } = operation('/api/detections', 'get')
    expect(parameters.find((parameter) => parameter.name === 'page')?.required).toBe(false)
    const [detectionId] = operation('/api/detections/{detectionId}', 'get').parameters
    expect(detectionId).toMatchObject({ in: 'path', required: true })
  })

  it('describes an upload as multipart form data with its file field', () => {
    const { requestBody } = operation('/api/stations/{stationId}/logs', 'post')
    const form = requestBody?.content['multipart/form-data']?.schema
    expect(Object.keys(form?.properties ?? {})).toEqual(
      expect.arrayContaining(['file', 'startedAtLocal', 'timeZone']),
    )
  })
})
