import { z } from 'zod'
import { localDateSchema, partsPerMillionSchema, partyIdSchema, shareIdSchema } from './primitives.ts'

/** The two rights money is divided between: in the work (composition) and in the recording. */
export const rightSchema = z.enum(['works', 'recordings'])
export type Right = z.infer<typeof rightSchema>

export const rightLabels = { works: 'Works', recordings: 'Recordings' } as const satisfies Record<
  Right,
  string
>

export const shareViewSchema = z.object({
  id: shareIdSchema,
  party: z.object({ id: partyIdSchema, name: z.string() }),
  sharePpm: partsPerMillionSchema,
  validFrom: localDateSchema,
  /** Last day covered, null while open-ended. */
  validTo: localDateSchema.nullable(),
})

export const shareSetSchema = z.object({
  items: z.array(shareViewSchema),
  /** Sum of what is valid today; what is missing to a million is held back. */
  totalTodayPpm: z.number().int().min(0),
})
export type ShareSet = z.infer<typeof shareSetSchema>

export const shareInputSchema = z
  .object({
    partyId: partyIdSchema,
    sharePpm: partsPerMillionSchema.min(1, 'A share is more than zero.'),
    validFrom: localDateSchema,
    validTo: localDateSchema.nullable(),
  })
  .refine((share) => share.validTo === null || share.validTo >= share.validFrom, {
    path: ['validTo'],
    error: 'The last day is before the first.',
  })
export type ShareInput = z.infer<typeof shareInputSchema>

export const sharesInputSchema = z.object({
  shares: z.array(shareInputSchema).max(200, 'At most 200 shares.'),
  /** The clerk has seen that less than 100 % is claimed and that the rest will be held back. */
  acceptIncomplete: z.boolean().default(false),
})

export type SharePeriodTotal = { from: string; to: string | null; totalPpm: number }

/**
 * Sums shares for every stretch of days on which the set of valid shares is the same, in order of time.
 * Days before the first share are left out. Dates are YYYY-MM-DD; `to` is the last day, null for open-ended.
 */
export function shareTotalsByPeriod(
  shares: readonly { sharePpm: number; validFrom: string; validTo: string | null }[],
): SharePeriodTotal[] {
  const starts = new Set<string>()
  for (const share of shares) {
    starts.add(share.validFrom)
    if (share.validTo !== null) starts.add(dayAfter(share.validTo))
  }
  const ordered = [...starts].sort()
  return ordered.flatMap((from, index) => {
    const next = ordered[index + 1]
    const valid = shares.filter(
      (share) => share.validFrom <= from && (share.validTo === null || share.validTo >= from),
    )
    if (next === undefined && valid.length === 0) return []
    const totalPpm = valid.reduce((sum, share) => sum + share.sharePpm, 0)
    return [{ from, to: next === undefined ? null : dayBefore(next), totalPpm }]
  })
}

const DAY_MS = 86_400_000

function dayAfter(day: string): string {
  return new Date(Date.parse(day) + DAY_MS).toISOString().slice(0, 10)
}

function dayBefore(day: string): string {
  return new Date(Date.parse(day) - DAY_MS).toISOString().slice(0, 10)
}
