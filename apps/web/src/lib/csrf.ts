/** The double-submit token: a cookie this origin can read, sent back as a header. */
export function csrfHeader(): Record<string, string> {
  const cookie = document.cookie.split('; ').find((part) => part.startsWith('fieldfare_csrf='))
  return cookie === undefined
    ? {}
    : { 'x-csrf-token': decodeURIComponent(cookie.slice('fieldfare_csrf='.length)) }
}
