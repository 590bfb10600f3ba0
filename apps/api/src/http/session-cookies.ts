import type { CookieOptions } from 'express'
import type { CookieJar } from './cookie-jar.ts'

export const ACCESS_COOKIE = 'fieldfare_access'
export const REFRESH_COOKIE = 'fieldfare_refresh'
export const CSRF_COOKIE = 'fieldfare_csrf'
export const CSRF_HEADER = 'x-csrf-token'

export type SessionCookieValues = {
  accessToken: string
  accessSeconds: number
  refreshToken: string
  csrfToken: string
  /** How long the browser keeps the refresh and CSRF cookies. */
  refreshSeconds: number
}

function optionsFor(isSecure: boolean) {
  const shared = { secure: isSecure, sameSite: 'lax' } as const
  return {
    access: { ...shared, httpOnly: true, path: '/api' },
    // Sent only where it is exchanged, so that it travels as seldom as possible.
    refresh: { ...shared, httpOnly: true, path: '/api/auth' },
    // Read by our own pages and sent back as a header, which other sites can do neither of.
    csrf: { ...shared, httpOnly: false, path: '/' },
  } satisfies Record<string, CookieOptions>
}

export function setSessionCookies(cookies: CookieJar, values: SessionCookieValues, isSecure: boolean): void {
  const options = optionsFor(isSecure)
  cookies.set(ACCESS_COOKIE, values.accessToken, { ...options.access, maxAge: values.accessSeconds * 1000 })
  cookies.set(REFRESH_COOKIE, values.refreshToken, {
    ...options.refresh,
    maxAge: values.refreshSeconds * 1000,
  })
  cookies.set(CSRF_COOKIE, values.csrfToken, { ...options.csrf, maxAge: values.refreshSeconds * 1000 })
}

export function clearSessionCookies(cookies: CookieJar, isSecure: boolean): void {
  const options = optionsFor(isSecure)
  cookies.clear(ACCESS_COOKIE, options.access)
  cookies.clear(REFRESH_COOKIE, options.refresh)
  cookies.clear(CSRF_COOKIE, options.csrf)
}
