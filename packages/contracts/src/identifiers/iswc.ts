import { z } from 'zod'
import { prepareCode } from './prepare-code.ts'

const brandedIswcSchema = z
  .string()
  .regex(/^T\d{10}$/)
  .brand<'Iswc'>()
export type Iswc = z.infer<typeof brandedIswcSchema>

export type IswcReading = { ok: true; iswc: Iswc } | { ok: false; message: string }

/** Check digit of nine work digits: S = 1 + Σ i·dᵢ, C = (10 − S mod 10) mod 10 (ISO 15707). */
export function iswcCheckDigit(workDigits: string): number {
  const sum = Array.from(workDigits).reduce((total, digit, index) => total + (index + 1) * Number(digit), 1)
  return (10 - (sum % 10)) % 10
}

/** Reads an International Standard Musical Work Code as typed, with or without separators (ISO 15707). */
export function readIswc(input: string): IswcReading {
  const compact = prepareCode(input)
    .replace(/^ISWC[\s:]*/, '')
    .replace(/[\s.-]/g, '')
  if (/^\d{10}$/.test(compact)) {
    return {
      ok: false,
      message: 'An ISWC begins with the letter T; ten figures alone could be another number.',
    }
  }
  const parsed = brandedIswcSchema.safeParse(compact)
  if (!parsed.success) {
    return { ok: false, message: 'An ISWC is T and ten figures, for example T-034.524.680-1.' }
  }
  const expected = iswcCheckDigit(compact.slice(1, 10))
  if (Number(compact.slice(10)) !== expected) {
    return {
      ok: false,
      message: `The check digit of this ISWC does not fit: ${compact.slice(10)}, expected ${expected}.`,
    }
  }
  return { ok: true, iswc: parsed.data }
}

/** T-DDD.DDD.DDD-C, the printed form. */
export function formatIswc(iswc: string): string {
  return `${iswc.slice(0, 1)}-${iswc.slice(1, 4)}.${iswc.slice(4, 7)}.${iswc.slice(7, 10)}-${iswc.slice(10)}`
}

/** Accepts what people type and gives the compact code. */
export const iswcSchema = z.string().transform((input, context): Iswc => {
  const reading = readIswc(input)
  if (reading.ok) return reading.iswc
  context.addIssue({ code: 'custom', message: reading.message })
  return z.NEVER
})
