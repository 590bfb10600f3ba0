import { z } from 'zod'
import { prepareCode } from './prepare-code.ts'

const brandedIpiSchema = z
  .string()
  .regex(/^\d{11}$/)
  .brand<'IpiNameNumber'>()
export type IpiNameNumber = z.infer<typeof brandedIpiSchema>

export type IpiReading = { ok: true; ipi: IpiNameNumber; checkOk: boolean } | { ok: false; message: string }

/** Check digits of nine: weights 10…2, r = Σ mod 101, check = 00 when r = 0, else (101 − r) mod 100 (CISAC IPI). */
export function ipiCheckDigits(firstNine: string): string {
  const sum = Array.from(firstNine).reduce((total, digit, index) => total + (10 - index) * Number(digit), 0)
  const remainder = sum % 101
  return String(remainder === 0 ? 0 : (101 - remainder) % 100).padStart(2, '0')
}

/**
 * Reads an IPI name number; shorter old numbers are padded with zeros to eleven figures.
 * A wrong check is reported in `checkOk`, not refused: many numbers in circulation fail it.
 */
export function readIpi(input: string): IpiReading {
  const compact = prepareCode(input)
    .replace(/^IPI[\s:]*/, '')
    .replace(/[\s.-]/g, '')
  if (!/^\d{5,11}$/.test(compact)) {
    return { ok: false, message: 'An IPI name number is up to eleven figures, for example 00014107338.' }
  }
  const padded = compact.padStart(11, '0')
  if (/^0+$/.test(padded))
    return { ok: false, message: 'An IPI name number of only zeros identifies nobody.' }
  return {
    ok: true,
    ipi: brandedIpiSchema.parse(padded),
    checkOk: ipiCheckDigits(padded.slice(0, 9)) === padded.slice(9),
  }
}

/** 000 141 073 38: grouped for reading. */
export function formatIpi(ipi: string): string {
  return `${ipi.slice(0, 3)} ${ipi.slice(3, 6)} ${ipi.slice(6, 9)} ${ipi.slice(9)}`
}

/** Accepts what people type and gives eleven figures; the check digits are judged apart, by `readIpi`. */
export const ipiSchema = z.string().transform((input, context): IpiNameNumber => {
  const reading = readIpi(input)
  if (reading.ok) return reading.ipi
  context.addIssue({ code: 'custom', message: reading.message })
  return z.NEVER
})
