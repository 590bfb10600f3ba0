const COOKIE = 'fieldfare_csrf='

function csrfCookie(): string | undefined {
  return document.cookie.split('; ').find((part) => part.startsWith(COOKIE))
}

/** The double-submit token: a cookie this origin can read, sent back as a header. */
export function csrfHeader(): Record<string, string> {
  const cookie = csrfCookie()
  return cookie === undefined ? {} : { 'x-csrf-token': decodeURIComponent(cookie.slice(COOKIE.length)) }
}

/** The token's cookie lives as long as the session could be renewed. */
export function hasSessionCookie(): boolean {
  return csrfCookie() !== undefined
}
