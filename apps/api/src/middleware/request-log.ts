import type { Request } from 'express'
import type { Logger } from 'pino'
import { pinoHttp } from 'pino-http'
import { z } from 'zod'

const requestSchema = z.object({ method: z.string(), url: z.string() })
const responseSchema = z.object({ statusCode: z.number().nullable() })

/** The path alone: what people search for, and links with tokens, stand behind the question mark. */
function describeRequest(request: unknown) {
  const parsed = requestSchema.safeParse(request)
  if (!parsed.success) return {}
  const [path = ''] = parsed.data.url.split('?')
  return { method: parsed.data.method, path }
}

function describeResponse(response: unknown) {
  const parsed = responseSchema.safeParse(response)
  return parsed.success ? { status: parsed.data.statusCode } : {}
}

/** A line for each request: no headers, no cookies, no addresses, no bodies. */
export function requestLog(logger: Logger, correlationIdOf: (request: Request) => string) {
  return pinoHttp<Request>({
    logger,
    genReqId: correlationIdOf,
    quietReqLogger: true,
    customAttributeKeys: { reqId: 'correlationId', responseTime: 'durationMs' },
    serializers: { req: describeRequest, res: describeResponse },
    wrapSerializers: false,
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? 'warn' : 'info'),
    autoLogging: { ignore: (request) => request.url.startsWith('/api/health/') },
  })
}
