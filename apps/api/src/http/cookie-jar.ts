import type { CookieOptions, Request, Response } from 'express'
import { z } from 'zod'

/** The cookies of one request and its answer. */
export type CookieJar = {
  get: (name: string) => string | null
  set: (name: string, value: string, options: CookieOptions) => void
  clear: (name: string, options: CookieOptions) => void
}

const cookiesSchema = z.record(z.string(), z.unknown())

export function readCookie(request: Request, name: string): string | null {
  const cookies = cookiesSchema.safeParse(request.cookies)
  const value = cookies.success ? cookies.data[name] : undefined
  return typeof value === 'string' && value !== '' ? value : null
}

export function cookieJar(request: Request, response: Response): CookieJar {
  return {
    get: (name) => readCookie(request, name),
    set: (name, value, options) => response.cookie(name, value, options),
    clear: (name, options) => response.clearCookie(name, options),
  }
}
