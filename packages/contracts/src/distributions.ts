import { z } from 'zod'
import { partyRefSchema } from './catalogue.ts'
import { defineEndpoint } from './endpoint.ts'
import { stationRefSchema } from './logs.ts'
import {
  amountMinorTextSchema,
  currencySchema,
  distributionIdSchema,
  instantSchema,
  monthSchema,
  partsPerMillionSchema,
  statementIdSchema,
} from './primitives.ts'
import { rightSchema } from './shares.ts'

const tag = 'Distribution'

/** open → calculating → calculated → approved (second clerk) → issuing → issued. */
export const monthStatusSchema = z.enum([
  'open',
  'calculating',
  'calculated',
  'approved',
  'issuing',
  'issued',
])
export type MonthStatus = z.infer<typeof monthStatusSchema>

export const monthStatusLabels = {
  open: 'Open',
  calculating: 'Being calculated',
  calculated: 'Calculated',
  approved: 'Approved',
  issuing: 'Statements being made',
  issued: 'Issued',
} as const satisfies Record<MonthStatus, string>

export const distributionSummarySchema = z.object({
  month: monthSchema,
  status: monthStatusSchema,
  currency: currencySchema,
  /** Null while nothing has been calculated. */
  feeMinor: amountMinorTextSchema.nullable(),
  netMinor: amountMinorTextSchema.nullable(),
  allocatedMinor: amountMinorTextSchema.nullable(),
  heldBackMinor: amountMinorTextSchema.nullable(),
  payees: z.number().int(),
  plays: z.number().int(),
  calculatedAt: instantSchema.nullable(),
  calculatedByName: z.string().nullable(),
  approvedAt: instantSchema.nullable(),
  approvedByName: z.string().nullable(),
  issuedAt: instantSchema.nullable(),
})
export type DistributionSummary = z.infer<typeof distributionSummarySchema>

export const namedDeductionSchema = z.object({
  code: z.string(),
  label: z.string(),
  ratePpm: partsPerMillionSchema,
  amountMinor: amountMinorTextSchema,
})

export const holdbackViewSchema = z.object({
  station: stationRefSchema,
  right: rightSchema,
  subject: z.string(),
  reasonCode: z.string(),
  reason: z.string(),
  amountMinor: amountMinorTextSchema,
})

/** Whether a step may be taken now by this person, and in words why not. */
const stepSchema = z.object({ allowed: z.boolean(), reason: z.string().nullable() })

export const distributionViewSchema = distributionSummarySchema.extend({
  id: distributionIdSchema.nullable(),
  run: z.number().int().nullable(),
  ruleVersion: z.string().nullable(),
  /** SHA-256 of the canonical result: calculating again gives the same one. */
  digest: z.string().nullable(),
  failure: z.string().nullable(),
  stations: z.array(
    z.object({
      station: stationRefSchema,
      heldSeconds: z.number(),
      expectedSeconds: z.number(),
      coveredDays: z.number().int(),
      feeMinor: amountMinorTextSchema,
      deductions: z.array(namedDeductionSchema),
      netMinor: amountMinorTextSchema,
      pools: z.array(
        z.object({
          right: rightSchema,
          poolMinor: amountMinorTextSchema,
          plays: z.number().int(),
          creditedSeconds: z.number(),
          /** Minor units an hour of credited airtime earned, rounded for reading only. */
          perHourMinor: amountMinorTextSchema.nullable(),
          allocatedMinor: amountMinorTextSchema,
          heldBackMinor: amountMinorTextSchema,
        }),
      ),
    }),
  ),
  holdbacks: z.array(holdbackViewSchema),
  payeeTotals: z.array(
    z.object({
      party: partyRefSchema,
      amountMinor: amountMinorTextSchema,
      statementId: statementIdSchema.nullable(),
    }),
  ),
  /** What a careful person would settle first: gaps, doubtful detections, open disputes. */
  cautions: z.array(z.string()),
  steps: z.object({ calculate: stepSchema, approve: stepSchema, issue: stepSchema, reopen: stepSchema }),
})
export type DistributionView = z.infer<typeof distributionViewSchema>

export const listDistributions = defineEndpoint({
  id: 'listDistributions',
  method: 'GET',
  path: '/api/distributions',
  tag,
  summary: 'Months with the state of their distribution, newest first',
  access: ['clerk', 'auditor'],
  answer: { kind: 'json', schema: z.object({ items: z.array(distributionSummarySchema) }) },
})

const monthParams = z.object({ month: monthSchema })

export const getDistribution = defineEndpoint({
  id: 'getDistribution',
  method: 'GET',
  path: '/api/distributions/:month',
  tag,
  summary: 'One month: fees, deductions, pools, holdbacks, payees and the next step',
  access: ['clerk', 'auditor'],
  params: monthParams,
  answer: { kind: 'json', schema: distributionViewSchema },
})

export const calculateDistribution = defineEndpoint({
  id: 'calculateDistribution',
  method: 'POST',
  path: '/api/distributions/:month/calculations',
  tag,
  summary: 'Calculate the month; again as often as needed until it is approved',
  access: ['clerk'],
  params: monthParams,
  answer: { kind: 'json', schema: distributionViewSchema },
})

export const approveDistribution = defineEndpoint({
  id: 'approveDistribution',
  method: 'POST',
  path: '/api/distributions/:month/approvals',
  tag,
  summary: 'Approve what was calculated; another clerk than the one who calculated it',
  access: ['clerk'],
  params: monthParams,
  /** The digest on the screen of the person approving: what they approve is what they saw. */
  body: z.object({ digest: z.string().regex(/^[0-9a-f]{64}$/) }),
  answer: { kind: 'json', schema: distributionViewSchema },
})

export const issueDistribution = defineEndpoint({
  id: 'issueDistribution',
  method: 'POST',
  path: '/api/distributions/:month/issues',
  tag,
  summary: 'Make the statements and open them to the publishers; cannot be undone',
  access: ['clerk'],
  params: monthParams,
  answer: { kind: 'json', schema: distributionViewSchema },
})

export const reopenDistribution = defineEndpoint({
  id: 'reopenDistribution',
  method: 'POST',
  path: '/api/distributions/:month/reopenings',
  tag,
  summary: 'Return a month that is not issued to open, with a reason',
  access: ['clerk'],
  params: monthParams,
  body: z.object({ reason: z.string().trim().min(5, 'Say why the month is opened again.').max(500) }),
  answer: { kind: 'json', schema: distributionViewSchema },
})
