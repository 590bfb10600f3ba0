import { z } from 'zod'
import { recordingRefSchema } from './catalogue.ts'
import { defineEndpoint } from './endpoint.ts'
import { stationRefSchema } from './logs.ts'
import { playStatusSchema } from './plays.ts'
import {
  detectionIdSchema,
  disputeIdSchema,
  instantSchema,
  localDateSchema,
  monthSchema,
  pageOf,
  pageQueryShape,
  playIdSchema,
  recordingIdSchema,
  sortSchema,
  stationIdSchema,
  stationLogIdSchema,
} from './primitives.ts'

const tag = 'Detections'
const detectionReaders = ['uploader', 'clerk', 'auditor'] as const

export const decisionSchema = z.enum(['accept', 'review'])
export type Decision = z.infer<typeof decisionSchema>

export const reviewStateSchema = z.enum(['accepted', 'waiting', 'confirmed', 'rejected'])
export type ReviewState = z.infer<typeof reviewStateSchema>

export const reviewStateLabels = {
  accepted: 'Accepted by the engine',
  waiting: 'Waiting for review',
  confirmed: 'Confirmed',
  rejected: 'Rejected',
} as const satisfies Record<ReviewState, string>

export const detectionViewSchema = z.object({
  id: detectionIdSchema,
  station: stationRefSchema,
  logId: stationLogIdSchema,
  recording: recordingRefSchema,
  startedAt: instantSchema,
  endedAt: instantSchema,
  durationSeconds: z.number(),
  /** −log10 of the false alarms expected, at most 99. */
  confidence: z.number(),
  expectedFalseAlarms: z.number(),
  decision: decisionSchema,
  reviewState: reviewStateSchema,
  play: z.object({ id: playIdSchema, status: playStatusSchema }).nullable(),
  openDisputeId: disputeIdSchema.nullable(),
})
export type DetectionView = z.infer<typeof detectionViewSchema>

export const historyEntrySchema = z.object({
  at: instantSchema,
  actorName: z.string(),
  what: z.string(),
  reason: z.string().nullable(),
})

export const detectionDetailSchema = detectionViewSchema.extend({
  logStartSeconds: z.number(),
  referenceStartSeconds: z.number(),
  speedRatio: z.number(),
  agreeingHashes: z.number().int(),
  engineVersion: z.string(),
  /** Moments where log and reference agree, in seconds from the start of each. */
  evidence: z.array(z.object({ logSeconds: z.number(), referenceSeconds: z.number() })),
  hasReferenceAudio: z.boolean(),
  history: z.array(historyEntrySchema),
  disputes: z.array(z.object({ id: disputeIdSchema, status: z.string(), openedAt: instantSchema })),
  isMonthOpen: z.boolean(),
  canReview: z.boolean(),
  canDispute: z.boolean(),
})
export type DetectionDetail = z.infer<typeof detectionDetailSchema>

const detectionFilters = {
  stationId: stationIdSchema.optional(),
  recordingId: recordingIdSchema.optional(),
  logId: stationLogIdSchema.optional(),
  month: monthSchema.optional(),
  day: localDateSchema.optional(),
  state: reviewStateSchema.optional(),
  search: z.string().trim().max(100).optional(),
  sort: sortSchema(['startedAt', 'durationSeconds', 'confidence', 'title', 'station'], '-startedAt'),
}

export const listDetections = defineEndpoint({
  id: 'listDetections',
  method: 'GET',
  path: '/api/detections',
  tag,
  summary: 'Detections in scope',
  access: detectionReaders,
  query: z.object({ ...pageQueryShape, ...detectionFilters }),
  answer: { kind: 'json', schema: pageOf(detectionViewSchema) },
})

export const exportDetections = defineEndpoint({
  id: 'exportDetections',
  method: 'GET',
  path: '/api/detections.csv',
  tag,
  summary: 'The same list as CSV, all pages of it',
  access: detectionReaders,
  query: z.object(detectionFilters),
  answer: { kind: 'file', mediaTypes: ['text/csv'] },
})

const detectionParams = z.object({ detectionId: detectionIdSchema })

export const getDetection = defineEndpoint({
  id: 'getDetection',
  method: 'GET',
  path: '/api/detections/:detectionId',
  tag,
  summary: 'One detection with its evidence and history',
  access: detectionReaders,
  params: detectionParams,
  answer: { kind: 'json', schema: detectionDetailSchema },
})

export const clipSourceSchema = z.enum(['log', 'reference'])
export type ClipSource = z.infer<typeof clipSourceSchema>

export const getDetectionClip = defineEndpoint({
  id: 'getDetectionClip',
  method: 'GET',
  path: '/api/detections/:detectionId/clips/:source',
  tag,
  summary: 'Up to 30 seconds to listen to, from the log or from the reference, beginning at the same moment',
  access: detectionReaders,
  params: z.object({ detectionId: detectionIdSchema, source: clipSourceSchema }),
  query: z.object({ fromSeconds: z.coerce.number().int().min(0).max(86_400).default(0) }),
  answer: { kind: 'file', mediaTypes: ['audio/mpeg'] },
})

export const reviewDetection = defineEndpoint({
  id: 'reviewDetection',
  method: 'POST',
  path: '/api/detections/:detectionId/reviews',
  tag,
  summary: 'Confirm or reject; the detection itself never changes, its play does',
  access: ['clerk'],
  params: detectionParams,
  body: z
    .object({
      outcome: z.enum(['confirmed', 'rejected']),
      reason: z.string().trim().max(1000, 'At most 1,000 characters.').default(''),
    })
    .refine((review) => review.outcome === 'confirmed' || review.reason !== '', {
      path: ['reason'],
      error: 'Say why it is rejected.',
    }),
  answer: { kind: 'json', schema: detectionDetailSchema },
})
