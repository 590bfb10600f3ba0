import { z } from 'zod'
import { defineEndpoint } from './endpoint.ts'

const tag = 'Documentation'

export const getOpenApi = defineEndpoint({
  id: 'getOpenApi',
  method: 'GET',
  path: '/api/openapi.json',
  tag,
  summary: 'This interface as an OpenAPI 3.1 document',
  access: 'public',
  answer: { kind: 'json', schema: z.record(z.string(), z.unknown()) },
})

export const getDocumentationPage = defineEndpoint({
  id: 'getDocumentationPage',
  method: 'GET',
  path: '/api/documentation',
  tag,
  summary: 'This interface as a page to read',
  access: 'public',
  answer: { kind: 'file', mediaTypes: ['text/html'] },
})
