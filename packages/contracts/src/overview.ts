import { z } from 'zod'
import { recordingRefSchema } from './catalogue.ts'
import { defineEndpoint } from './endpoint.ts'
import { monthStatusSchema } from './distributions.ts'
import { stationRefSchema } from './logs.ts'
import { localDateSchema, monthSchema } from './primitives.ts'

const tag = 'Overview'

const airtimeTotalsShape = {
  heldSeconds: z.number(),
  musicSeconds: z.number(),
  identifiedSeconds: z.number(),
  plays: z.number().int(),
}

export const monthOverviewSchema = z.object({
  month: monthSchema,
  status: monthStatusSchema,
  totals: z.object({
    ...airtimeTotalsShape,
    expectedSeconds: z.number(),
    waitingForReview: z.number().int(),
    openDisputes: z.number().int(),
    logsInWork: z.number().int(),
    logsRefused: z.number().int(),
  }),
  stations: z.array(
    z.object({
      station: stationRefSchema,
      ...airtimeTotalsShape,
      expectedSeconds: z.number(),
      logs: z.number().int(),
      waitingForReview: z.number().int(),
    }),
  ),
  days: z.array(z.object({ day: localDateSchema, ...airtimeTotalsShape })),
  /** Station-local hours 0 to 23. */
  hours: z.array(z.object({ hour: z.number().int(), ...airtimeTotalsShape })),
  topRecordings: z.array(
    z.object({ recording: recordingRefSchema, plays: z.number().int(), seconds: z.number() }),
  ),
})
export type MonthOverview = z.infer<typeof monthOverviewSchema>

export const getMonthOverview = defineEndpoint({
  id: 'getMonthOverview',
  method: 'GET',
  path: '/api/months/:month/overview',
  tag,
  summary: 'A month at a glance: play counts per station, airtime, identified share',
  access: ['uploader', 'clerk', 'auditor'],
  params: z.object({ month: monthSchema }),
  answer: { kind: 'json', schema: monthOverviewSchema },
})

export const listMonths = defineEndpoint({
  id: 'listMonths',
  method: 'GET',
  path: '/api/months',
  tag,
  summary: 'Months in which something is held, newest first, with the state of their distribution',
  access: 'signed-in',
  answer: {
    kind: 'json',
    schema: z.object({
      /** The last complete month: what the desk works on now. */
      current: monthSchema,
      items: z.array(z.object({ month: monthSchema, status: monthStatusSchema })),
    }),
  },
})
