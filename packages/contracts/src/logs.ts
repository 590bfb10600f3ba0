import { z } from 'zod'
import { defineEndpoint } from './endpoint.ts'
import {
  instantSchema,
  localDateTimeSchema,
  monthSchema,
  pageOf,
  pageQueryShape,
  sortSchema,
  stationIdSchema,
  stationLogIdSchema,
  timeZoneSchema,
} from './primitives.ts'
import { airtimeSpanSchema } from './stations.ts'

const tag = 'Station logs'
const logReaders = ['uploader', 'clerk', 'auditor'] as const

export const stationRefSchema = z.object({
  id: stationIdSchema,
  callName: z.string(),
  name: z.string(),
  timeZone: timeZoneSchema,
})
export type StationRef = z.infer<typeof stationRefSchema>

export const logStatusSchema = z.enum(['queued', 'analysing', 'analysed', 'rejected', 'failed'])
export type LogStatus = z.infer<typeof logStatusSchema>

export const logStatusLabels = {
  queued: 'Waiting',
  analysing: 'Being analysed',
  analysed: 'Analysed',
  rejected: 'Refused',
  failed: 'Failed',
} as const satisfies Record<LogStatus, string>

export const logStageSchema = z.enum(['checking', 'matching', 'writing'])

export const logProgressSchema = z.object({
  stage: logStageSchema,
  doneSeconds: z.number(),
  totalSeconds: z.number().nullable(),
  secondsLeft: z.number().nullable(),
})
export type LogProgress = z.infer<typeof logProgressSchema>

export const stationLogViewSchema = z.object({
  id: stationLogIdSchema,
  station: stationRefSchema,
  fileName: z.string(),
  sizeBytes: z.number(),
  format: z.string().nullable(),
  startedAt: instantSchema,
  /** Known once the recording was read. */
  endedAt: instantSchema.nullable(),
  durationSeconds: z.number().nullable(),
  status: logStatusSchema,
  progress: logProgressSchema.nullable(),
  /** Why it was refused or failed and what to do, in plain words. */
  failure: z.object({ code: z.string(), message: z.string() }).nullable(),
  warnings: z.array(z.string()),
  uploadedByName: z.string(),
  uploadedAt: instantSchema,
  analysedAt: instantSchema.nullable(),
  musicSeconds: z.number().nullable(),
  speechSeconds: z.number().nullable(),
  silenceSeconds: z.number().nullable(),
  identifiedSeconds: z.number().nullable(),
  detections: z.number().int(),
  canAnalyseAgain: z.boolean(),
})
export type StationLogView = z.infer<typeof stationLogViewSchema>

export const logUploadSchema = z.object({
  startedAtLocal: localDateTimeSchema,
  timeZone: timeZoneSchema,
  /** Asked for only when clocks went back and the local time happened twice. */
  occurrence: z.enum(['earlier', 'later']).optional(),
})
export type LogUpload = z.infer<typeof logUploadSchema>

export const uploadLog = defineEndpoint({
  id: 'uploadLog',
  method: 'POST',
  path: '/api/stations/:stationId/logs',
  tag,
  summary: 'Send a station log with its start in local time; duplicates and overlaps are refused',
  access: ['uploader', 'clerk'],
  params: z.object({ stationId: stationIdSchema }),
  body: logUploadSchema,
  file: { field: 'file', description: 'MP3, WAV, FLAC, Ogg (Vorbis or Opus), M4A or AAC' },
  answer: { kind: 'json', schema: stationLogViewSchema },
})

const logFilters = {
  stationId: stationIdSchema.optional(),
  month: monthSchema.optional(),
  status: logStatusSchema.optional(),
}

export const listLogs = defineEndpoint({
  id: 'listLogs',
  method: 'GET',
  path: '/api/logs',
  tag,
  summary: 'Station logs in scope',
  access: logReaders,
  query: z.object({
    ...pageQueryShape,
    ...logFilters,
    sort: sortSchema(['startedAt', 'uploadedAt', 'durationSeconds', 'station'], '-startedAt'),
  }),
  answer: { kind: 'json', schema: pageOf(stationLogViewSchema) },
})

const logParams = z.object({ logId: stationLogIdSchema })

export const getLog = defineEndpoint({
  id: 'getLog',
  method: 'GET',
  path: '/api/logs/:logId',
  tag,
  summary: 'One station log with what was heard in it',
  access: logReaders,
  params: logParams,
  answer: {
    kind: 'json',
    schema: z.object({ log: stationLogViewSchema, spans: z.array(airtimeSpanSchema) }),
  },
})

export const analyseLogAgain = defineEndpoint({
  id: 'analyseLogAgain',
  method: 'POST',
  path: '/api/logs/:logId/analyses',
  tag,
  summary: 'Analyse a log again with the present catalogue; what was found before stays, nothing doubles',
  access: ['clerk'],
  params: logParams,
  answer: { kind: 'json', schema: stationLogViewSchema },
})
