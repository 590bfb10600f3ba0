import { endpoints, type Endpoint } from '@fieldfare/contracts'
import type { NextFunction, Request, Response } from 'express'
import { AppError } from '../http/app-error.ts'

/** The words of an address that no feature answers, apart from a thing that does not exist. */
export const NO_SUCH_ADDRESS = 'This interface has no such address.'

function patternOf(endpoint: Endpoint): RegExp {
  const escaped = endpoint.path.replaceAll('.', '\\.').replaceAll(/:[A-Za-z]+/g, '[^/]+')
  return new RegExp(`^${escaped}/?$`)
}

const patterns = endpoints.map((endpoint) => ({ method: endpoint.method, pattern: patternOf(endpoint) }))

/** Behind all features: an address that is known by another method answers 405, everything else 404. */
export function refuseUnknownAddress(request: Request, response: Response, next: NextFunction): void {
  const path = request.baseUrl + request.path
  const methods = patterns.filter(({ pattern }) => pattern.test(path)).map(({ method }) => method)
  if (methods.length === 0 || methods.some((method) => method === request.method)) {
    next(new AppError('not-found', { detail: NO_SUCH_ADDRESS }))
    return
  }
  const allowed = [...new Set(methods)].join(', ')
  response.setHeader('allow', allowed)
  next(new AppError('method-not-allowed', { detail: `This address takes only ${allowed}.` }))
}
