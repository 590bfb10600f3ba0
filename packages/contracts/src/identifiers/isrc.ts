import { z } from 'zod'
import { prepareCode } from './prepare-code.ts'

/** Letters allotted as ISRC prefixes beyond ISO 3166 (ISRC agency bulletins; QZ and QT from memory). */
const extraPrefixes = new Set(['QM', 'QZ', 'QT', 'BC', 'BK', 'BP', 'BX', 'TC', 'CP', 'DG', 'ZZ', 'UK', 'XK'])

const regionNames = new Intl.DisplayNames(['en'], { type: 'region', fallback: 'none' })

export type IsrcReading = { ok: true; isrc: Isrc; warning: string | null } | { ok: false; message: string }

const compactIsrc = /^[A-Z]{2}[A-Z0-9]{3}[0-9]{7}$/

const brandedIsrcSchema = z.string().regex(compactIsrc).brand<'Isrc'>()
export type Isrc = z.infer<typeof brandedIsrcSchema>

/**
 * Reads an International Standard Recording Code as people type it (ISO 3901:2019, presentation forms of Annex C).
 * The label "ISRC", spaces and dashes are not part of the code; it has no check digit, so form is all that can be tested.
 */
export function readIsrc(input: string): IsrcReading {
  const compact = prepareCode(input)
    .replace(/^ISRC[\s:]*/, '')
    .replace(/[\s-]/g, '')
  if (compact.length !== 12) {
    return { ok: false, message: `An ISRC has 12 characters; this has ${compact.length}.` }
  }
  const parsed = brandedIsrcSchema.safeParse(compact)
  if (!parsed.success) return { ok: false, message: explainForm(compact) }
  const prefix = compact.slice(0, 2)
  const allocated = extraPrefixes.has(prefix) || isRegion(prefix)
  return {
    ok: true,
    isrc: parsed.data,
    warning: allocated ? null : `The prefix ${prefix} is not one known to be allotted.`,
  }
}

function isRegion(prefix: string): boolean {
  // ISO 3166-1 leaves XA–XZ, AA, QM–QZ and ZZ to users; DisplayNames names some of them, ISRC does not use them.
  return !/^(X[A-Z]|AA|Q[M-Z]|ZZ)$/.test(prefix) && regionNames.of(prefix) !== undefined
}

function explainForm(compact: string): string {
  const figures = compact.slice(5)
  const suggestion = compact.slice(0, 5) + figures.replaceAll('O', '0').replaceAll('I', '1')
  if (suggestion !== compact && compactIsrc.test(suggestion)) {
    return `The last seven characters of an ISRC are figures. Did you mean ${suggestion}?`
  }
  return 'An ISRC is two letters, three letters or figures, then seven figures, for example AA6Q72000047.'
}

/** Groups a compact ISRC for reading, AA-6Q7-20-00047. */
export function formatIsrc(isrc: string): string {
  return `${isrc.slice(0, 2)}-${isrc.slice(2, 5)}-${isrc.slice(5, 7)}-${isrc.slice(7)}`
}

/** Accepts what people type and gives the compact code. */
export const isrcSchema = z.string().transform((input, context): Isrc => {
  const reading = readIsrc(input)
  if (reading.ok) return reading.isrc
  context.addIssue({ code: 'custom', message: reading.message })
  return z.NEVER
})
