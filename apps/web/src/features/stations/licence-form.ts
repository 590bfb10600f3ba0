import { licenceInputSchema, localDateSchema, type LicenceView } from '@fieldfare/contracts'
import { z } from 'zod'
import { formatMinor, parseMoney } from '../../lib/format-money.ts'
import { percentToPpm, ppmToPercent } from '../../lib/percent-text.ts'

export type LicenceFields = {
  validFrom: string
  validTo: string
  monthlyFeeMinor: string
  worksPartPpm: string
}

function isDay(text: string): boolean {
  return localDateSchema.safeParse(text).success
}

/** A licence as typed: an amount in the currency's major unit and a percentage; field names are the contract's. */
export function licenceFormSchema(currencyDigits: number) {
  return z
    .object({
      validFrom: z.string().refine(isDay, 'Enter the first day it is valid.'),
      validTo: z
        .string()
        .refine((text) => text === '' || isDay(text), 'Enter the last day, or leave it empty.')
        .transform((text) => (text === '' ? null : text)),
      monthlyFeeMinor: z.string().transform((text, context) => {
        const minor = parseMoney(text, currencyDigits)
        if (minor !== null) return minor
        context.addIssue({ code: 'custom', message: 'Enter an amount such as 1,250.00.' })
        return z.NEVER
      }),
      worksPartPpm: z.string().transform((text, context) => {
        const ppm = percentToPpm(text)
        if (ppm !== null) return ppm
        context.addIssue({
          code: 'custom',
          message: 'Enter a percentage from 0 to 100 with at most four decimals.',
        })
        return z.NEVER
      }),
    })
    .pipe(licenceInputSchema)
}

/** An existing licence as the form shows it; a new one begins with an even split. */
export function licenceFields(licence: LicenceView | null, currencyDigits: number): LicenceFields {
  if (licence === null) return { validFrom: '', validTo: '', monthlyFeeMinor: '', worksPartPpm: '50' }
  const { sign, figures } = formatMinor(licence.monthlyFeeMinor, currencyDigits)
  return {
    validFrom: licence.validFrom,
    validTo: licence.validTo ?? '',
    monthlyFeeMinor: `${sign}${figures}`,
    worksPartPpm: ppmToPercent(licence.worksPartPpm),
  }
}
