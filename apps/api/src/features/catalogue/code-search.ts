import { containsPattern } from '@fieldfare/database'

/** What people type of a code, without the marks it is printed with; null when it cannot be part of one. */
export function codePattern(search: string): string | null {
  const compact = search.toUpperCase().replaceAll(/[\s.\-‐-―]/g, '')
  return /^[A-Z0-9]{3,}$/.test(compact) ? containsPattern(compact) : null
}
