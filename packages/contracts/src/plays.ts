import { z } from 'zod'
import { recordingRefSchema, workRefSchema } from './catalogue.ts'
import { defineEndpoint } from './endpoint.ts'
import {
  detectionIdSchema,
  instantSchema,
  localDateSchema,
  monthSchema,
  pageOf,
  pageQueryShape,
  partyIdSchema,
  playIdSchema,
  recordingIdSchema,
  sortSchema,
  stationIdSchema,
  timeZoneSchema,
} from './primitives.ts'

const tag = 'Plays'
const playReaders = ['uploader', 'clerk', 'publisher', 'auditor'] as const

export const playStatusSchema = z.enum(['counted', 'removed'])
export type PlayStatus = z.infer<typeof playStatusSchema>

export const playViewSchema = z.object({
  id: playIdSchema,
  /** Null for plays that did not come from a detection. */
  detectionId: detectionIdSchema.nullable(),
  station: z.object({
    id: stationIdSchema,
    callName: z.string(),
    name: z.string(),
    timeZone: timeZoneSchema,
  }),
  recording: recordingRefSchema,
  work: workRefSchema.nullable(),
  startedAt: instantSchema,
  endedAt: instantSchema,
  durationSeconds: z.number(),
  /** Day in the station's zone: decides month, shares and licence. */
  localDay: localDateSchema,
  status: playStatusSchema,
  isInDispute: z.boolean(),
  canDispute: z.boolean(),
})
export type PlayView = z.infer<typeof playViewSchema>

const playFilters = {
  stationId: stationIdSchema.optional(),
  recordingId: recordingIdSchema.optional(),
  partyId: partyIdSchema.optional(),
  month: monthSchema.optional(),
  day: localDateSchema.optional(),
  status: playStatusSchema.optional(),
  search: z.string().trim().max(100).optional(),
  sort: sortSchema(['startedAt', 'durationSeconds', 'title', 'station'], '-startedAt'),
}

export const listPlays = defineEndpoint({
  id: 'listPlays',
  method: 'GET',
  path: '/api/plays',
  tag,
  summary: 'Plays in scope; a publisher sees those in which their parties hold a share',
  access: playReaders,
  query: z.object({ ...pageQueryShape, ...playFilters }),
  answer: { kind: 'json', schema: pageOf(playViewSchema) },
})

export const exportPlays = defineEndpoint({
  id: 'exportPlays',
  method: 'GET',
  path: '/api/plays.csv',
  tag,
  summary: 'The same list as CSV, all pages of it',
  access: playReaders,
  query: z.object(playFilters),
  answer: { kind: 'file', mediaTypes: ['text/csv'] },
})

export const playCountSchema = z.object({
  station: z.object({ id: stationIdSchema, callName: z.string(), name: z.string() }),
  plays: z.number().int(),
  seconds: z.number(),
})

export const getRecordingPlays = defineEndpoint({
  id: 'getRecordingPlays',
  method: 'GET',
  path: '/api/recordings/:recordingId/play-counts',
  tag,
  summary: 'Where and when a recording was played: by station and by month',
  access: ['clerk', 'publisher', 'auditor'],
  params: z.object({ recordingId: recordingIdSchema }),
  answer: {
    kind: 'json',
    schema: z.object({
      stations: z.array(playCountSchema),
      months: z.array(z.object({ month: monthSchema, plays: z.number().int(), seconds: z.number() })),
    }),
  },
})
