import { z } from 'zod'
import { recordingRefSchema } from './catalogue.ts'
import { defineEndpoint } from './endpoint.ts'
import { stationRefSchema } from './logs.ts'
import { playStatusSchema } from './plays.ts'
import {
  detectionIdSchema,
  disputeIdSchema,
  instantSchema,
  monthSchema,
  pageOf,
  pageQueryShape,
  playIdSchema,
  sortSchema,
  textSchema,
} from './primitives.ts'
import { roleSchema } from './roles.ts'

const tag = 'Disputes'
const disputeReaders = ['clerk', 'publisher', 'auditor'] as const

export const disputeStatusSchema = z.enum(['open', 'upheld', 'dismissed'])
export type DisputeStatus = z.infer<typeof disputeStatusSchema>

export const disputeStatusLabels = {
  open: 'Open',
  upheld: 'Upheld',
  dismissed: 'Dismissed',
} as const satisfies Record<DisputeStatus, string>

export const disputeSummarySchema = z.object({
  id: disputeIdSchema,
  number: z.number().int(),
  status: disputeStatusSchema,
  detectionId: detectionIdSchema.nullable(),
  play: z.object({ id: playIdSchema, status: playStatusSchema }),
  station: stationRefSchema,
  recording: recordingRefSchema,
  startedAt: instantSchema,
  endedAt: instantSchema,
  month: monthSchema,
  reason: z.string(),
  openedAt: instantSchema,
  openedByName: z.string(),
  openedByRole: roleSchema,
  decidedAt: instantSchema.nullable(),
  decidedByName: z.string().nullable(),
})
export type DisputeSummary = z.infer<typeof disputeSummarySchema>

export const disputeViewSchema = disputeSummarySchema.extend({
  decisionReason: z.string().nullable(),
  messages: z.array(
    z.object({
      id: z.string(),
      at: instantSchema,
      authorName: z.string(),
      authorRole: roleSchema,
      text: z.string(),
    }),
  ),
  isMonthOpen: z.boolean(),
  canReply: z.boolean(),
  canDecide: z.boolean(),
})
export type DisputeView = z.infer<typeof disputeViewSchema>

export const listDisputes = defineEndpoint({
  id: 'listDisputes',
  method: 'GET',
  path: '/api/disputes',
  tag,
  summary: 'Disputes in scope',
  access: disputeReaders,
  query: z.object({
    ...pageQueryShape,
    status: disputeStatusSchema.optional(),
    month: monthSchema.optional(),
    sort: sortSchema(['number', 'openedAt', 'station', 'title'], '-openedAt'),
  }),
  answer: { kind: 'json', schema: pageOf(disputeSummarySchema) },
})

export const openDispute = defineEndpoint({
  id: 'openDispute',
  method: 'POST',
  path: '/api/disputes',
  tag,
  summary: 'Dispute a play, with a reason; one open dispute a play',
  access: ['auditor', 'publisher'],
  body: z.object({ playId: playIdSchema, reason: textSchema('Reason', 2000) }),
  answer: { kind: 'json', schema: disputeViewSchema },
})

const disputeParams = z.object({ disputeId: disputeIdSchema })

export const getDispute = defineEndpoint({
  id: 'getDispute',
  method: 'GET',
  path: '/api/disputes/:disputeId',
  tag,
  summary: 'One dispute with its messages',
  access: disputeReaders,
  params: disputeParams,
  answer: { kind: 'json', schema: disputeViewSchema },
})

export const replyToDispute = defineEndpoint({
  id: 'replyToDispute',
  method: 'POST',
  path: '/api/disputes/:disputeId/messages',
  tag,
  summary: 'Add a message to an open dispute',
  access: disputeReaders,
  params: disputeParams,
  body: z.object({ text: textSchema('Message', 4000) }),
  answer: { kind: 'json', schema: disputeViewSchema },
})

export const decideDispute = defineEndpoint({
  id: 'decideDispute',
  method: 'POST',
  path: '/api/disputes/:disputeId/decisions',
  tag,
  summary: 'Uphold (the play is removed from its open month) or dismiss, with a reason',
  access: ['clerk'],
  params: disputeParams,
  body: z.object({ outcome: z.enum(['upheld', 'dismissed']), reason: textSchema('Reason', 2000) }),
  answer: { kind: 'json', schema: disputeViewSchema },
})
