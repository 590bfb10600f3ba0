import { z } from 'zod'
import { clipSourceSchema } from './detections.ts'
import {
  detectionIdSchema,
  distributionIdSchema,
  mailMessageIdSchema,
  referenceAudioIdSchema,
  stationLogIdSchema,
} from './primitives.ts'

/** Everything a worker can be asked to do; a job is a row in PostgreSQL before it is in the queue. */
export const jobPayloadSchemas = {
  'fingerprint-reference': z.object({ referenceAudioId: referenceAudioIdSchema }),
  'analyse-log': z.object({ logId: stationLogIdSchema }),
  'cut-clip': z.object({
    detectionId: detectionIdSchema,
    source: clipSourceSchema,
    fromSeconds: z.number().int().min(0),
  }),
  'calculate-distribution': z.object({ distributionId: distributionIdSchema }),
  'render-statements': z.object({ distributionId: distributionIdSchema }),
  'send-mail': z.object({ mailMessageId: mailMessageIdSchema }),
} as const satisfies Record<string, z.ZodObject>

export type JobKind = keyof typeof jobPayloadSchemas
export type JobPayload<Kind extends JobKind> = z.output<(typeof jobPayloadSchemas)[Kind]>

export const jobLabels = {
  'fingerprint-reference': 'Fingerprint reference audio',
  'analyse-log': 'Analyse station logs',
  'cut-clip': 'Cut clips to listen to',
  'calculate-distribution': 'Calculate a distribution',
  'render-statements': 'Make statements',
  'send-mail': 'Send mail',
} as const satisfies Record<JobKind, string>

/** Long work runs in its own queue so that a short request never waits behind a day of audio. */
export const jobQueues = {
  'fingerprint-reference': 'audio',
  'analyse-log': 'audio',
  'cut-clip': 'quick',
  'calculate-distribution': 'quick',
  'render-statements': 'quick',
  'send-mail': 'quick',
} as const satisfies Record<JobKind, 'audio' | 'quick'>
