import {
  localDateSchema,
  partyIdSchema,
  shareTotalsByPeriod,
  type SharePeriodTotal,
} from '@fieldfare/contracts'
import { z } from 'zod'
import { formatDay } from '../../lib/format-time.ts'
import { percentToPpm, ppmToPercent, WHOLE_PPM } from '../../lib/percent-text.ts'

const percentSchema = z.string().transform((text, context): number => {
  const ppm = percentToPpm(text)
  if (ppm !== null && ppm > 0) return ppm
  context.addIssue({
    code: 'custom',
    message: 'Write a percentage above 0 and up to 100, with at most four decimals.',
  })
  return z.NEVER
})

const rowSchema = z
  .object({
    partyId: z
      .string()
      .refine((id) => id !== '', 'Choose a party.')
      .pipe(partyIdSchema),
    partyName: z.string(),
    sharePpm: percentSchema,
    validFrom: z
      .string()
      .refine((day) => day !== '', 'Say from which day on.')
      .pipe(localDateSchema),
    validTo: z
      .string()
      .transform((day) => (day === '' ? null : day))
      .pipe(localDateSchema.nullable()),
  })
  .refine((row) => row.validTo === null || row.validTo >= row.validFrom, {
    path: ['validTo'],
    error: 'The last day is before the first.',
  })

/** Names of fields as in the request, so that the server's complaints find them. */
export const sharesFormSchema = z
  .object({ shares: z.array(rowSchema).max(200, 'At most 200 shares.'), acceptIncomplete: z.boolean() })
  .superRefine(({ shares, acceptIncomplete }, context) => {
    const totals = shareTotalsByPeriod(shares)
    if (totals.some(({ totalPpm }) => totalPpm > WHOLE_PPM)) {
      context.addIssue({
        code: 'custom',
        path: ['shares'],
        message: 'More than 100 % is claimed on some days. Lower a share or end it before the next begins.',
      })
    } else if (!acceptIncomplete && isIncomplete(totals)) {
      context.addIssue({
        code: 'custom',
        path: ['acceptIncomplete'],
        message: 'Less than 100 % is claimed. Tick this to hold back the rest, or complete the shares.',
      })
    }
  })
export type SharesFormInput = z.input<typeof sharesFormSchema>
export type SharesFormOutput = z.output<typeof sharesFormSchema>
export type ShareRowInput = SharesFormInput['shares'][number]

/** Whether something stays unclaimed on any day from the first share on, or altogether. */
export function isIncomplete(totals: readonly SharePeriodTotal[]): boolean {
  return totals.length === 0 || totals.some(({ totalPpm }) => totalPpm < WHOLE_PPM)
}

/** The totals of what is typed so far; rows that are not readable yet count nothing. */
export function totalsOfDraft(rows: readonly ShareRowInput[]): SharePeriodTotal[] {
  return shareTotalsByPeriod(
    rows.flatMap((row) => {
      const sharePpm = percentToPpm(row.sharePpm)
      const from = localDateSchema.safeParse(row.validFrom)
      const to = row.validTo === '' ? null : row.validTo
      if (sharePpm === null || !from.success || (to !== null && to < row.validFrom)) return []
      return [{ sharePpm, validFrom: row.validFrom, validTo: to }]
    }),
  )
}

export function periodInWords({ from, to }: Pick<SharePeriodTotal, 'from' | 'to'>): string {
  return to === null ? `from ${formatDay(from)} on` : `${formatDay(from)} to ${formatDay(to)}`
}

/** What a total means for the money. */
export function verdictOn(totalPpm: number): { tone: 'good' | 'warn' | 'bad'; words: string } {
  if (totalPpm === WHOLE_PPM) return { tone: 'good', words: 'All of it is claimed' }
  if (totalPpm < WHOLE_PPM) {
    return { tone: 'warn', words: `${ppmToPercent(WHOLE_PPM - totalPpm)} % will be held back` }
  }
  return { tone: 'bad', words: `${ppmToPercent(totalPpm - WHOLE_PPM)} % too much` }
}
