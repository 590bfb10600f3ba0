import { z } from 'zod'
import { referenceStatusSchema } from './catalogue.ts'
import { monthStatusSchema } from './distributions.ts'
import { defineEndpoint } from './endpoint.ts'
import { logProgressSchema, logStatusSchema } from './logs.ts'
import {
  monthSchema,
  recordingIdSchema,
  referenceAudioIdSchema,
  stationIdSchema,
  stationLogIdSchema,
} from './primitives.ts'

/** What workers tell while they work; each viewer gets only what is in their scope. */
export const serverEventSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('log-progress'),
    logId: stationLogIdSchema,
    stationId: stationIdSchema,
    status: logStatusSchema,
    progress: logProgressSchema.nullable(),
  }),
  z.object({
    kind: z.literal('reference-progress'),
    referenceAudioId: referenceAudioIdSchema,
    recordingId: recordingIdSchema,
    status: referenceStatusSchema.exclude(['none']),
    fraction: z.number().min(0).max(1).nullable(),
  }),
  z.object({
    kind: z.literal('distribution-progress'),
    month: monthSchema,
    status: monthStatusSchema,
    done: z.number().int(),
    total: z.number().int(),
  }),
])
export type ServerEvent = z.infer<typeof serverEventSchema>

export const streamEvents = defineEndpoint({
  id: 'streamEvents',
  method: 'GET',
  path: '/api/events',
  tag: 'Live progress',
  summary: 'Server-Sent Events: progress of logs, fingerprints and distributions in scope',
  access: 'signed-in',
  answer: { kind: 'events', schema: serverEventSchema },
})
