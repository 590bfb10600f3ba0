/** The secret of an e-mailed link; behind '#', so that it never reaches a server's log, or in the query. */
export function readLinkToken(location: { hash: string; search: string }): string | null {
  const inFragment = new URLSearchParams(location.hash.replace(/^#/, '')).get('token')
  const token = inFragment ?? new URLSearchParams(location.search).get('token')
  return token === '' ? null : token
}
