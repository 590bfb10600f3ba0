/** The sign-in page with the way back. */
export function signInAddress(from: { pathname: string; search: string }): string {
  const here = `${from.pathname}${from.search}`
  return here === '/' ? '/sign-in' : `/sign-in?return=${encodeURIComponent(here)}`
}

/** Where to go after sign-in: only addresses of this application, never another site's. */
export function readReturnAddress(search: URLSearchParams): string {
  const wanted = search.get('return') ?? '/'
  if (!URL.canParse(wanted, window.location.origin)) return '/'
  const address = new URL(wanted, window.location.origin)
  const isOurs =
    address.origin === window.location.origin && wanted.startsWith('/') && !wanted.startsWith('//')
  return isOurs ? `${address.pathname}${address.search}` : '/'
}
