import { z } from 'zod'
import { defineEndpoint } from './endpoint.ts'
import { ipiSchema } from './identifiers/ipi.ts'
import { isrcSchema } from './identifiers/isrc.ts'
import { iswcSchema } from './identifiers/iswc.ts'
import {
  instantSchema,
  pageOf,
  pageQueryShape,
  partyIdSchema,
  recordingIdSchema,
  sortSchema,
  textSchema,
  workIdSchema,
} from './primitives.ts'
import { sharesInputSchema, shareSetSchema } from './shares.ts'

const tag = 'Catalogue'
const catalogueReaders = ['clerk', 'publisher', 'auditor'] as const
const clerks = ['clerk'] as const

const searchQuery = z.string().trim().max(100).optional()

function emptyToNull(value: unknown): unknown {
  return typeof value === 'string' && value.trim() === '' ? null : value
}

/** A form sends an empty field for "none". */
function optionalCode<Schema extends z.ZodType>(schema: Schema) {
  return z.preprocess(emptyToNull, schema.nullable())
}

export const partyRefSchema = z.object({ id: partyIdSchema, name: z.string() })
export const workRefSchema = z.object({ id: workIdSchema, title: z.string(), iswc: z.string().nullable() })
export const recordingRefSchema = z.object({
  id: recordingIdSchema,
  isrc: z.string(),
  title: z.string(),
  artist: z.string(),
})
export type PartyRef = z.infer<typeof partyRefSchema>
export type WorkRef = z.infer<typeof workRefSchema>
export type RecordingRef = z.infer<typeof recordingRefSchema>

export const partyViewSchema = z.object({
  id: partyIdSchema,
  name: z.string(),
  ipi: z.string().nullable(),
  /** False when the check digits of the IPI do not fit: worth a look, not an error. */
  ipiCheckOk: z.boolean().nullable(),
  works: z.number().int(),
  recordings: z.number().int(),
  canEdit: z.boolean(),
})
export type PartyView = z.infer<typeof partyViewSchema>

export const partyInputSchema = z.object({ name: textSchema('Name', 160), ipi: optionalCode(ipiSchema) })

export const workViewSchema = z.object({
  id: workIdSchema,
  title: z.string(),
  creators: z.string(),
  iswc: z.string().nullable(),
  recordings: z.array(recordingRefSchema),
  shares: shareSetSchema,
  canEdit: z.boolean(),
})
export type WorkView = z.infer<typeof workViewSchema>

export const workInputSchema = z.object({
  title: textSchema('Title', 200),
  creators: z.string().trim().max(300, 'Creators may have at most 300 characters.').default(''),
  iswc: optionalCode(iswcSchema),
})

export const referenceStatusSchema = z.enum(['none', 'waiting', 'fingerprinting', 'ready', 'failed'])
export type ReferenceStatus = z.infer<typeof referenceStatusSchema>

export const recordingViewSchema = z.object({
  id: recordingIdSchema,
  isrc: z.string(),
  /** Said when the ISRC prefix is not one known to be allotted. */
  isrcWarning: z.string().nullable(),
  title: z.string(),
  artist: z.string(),
  durationSeconds: z.number().nullable(),
  work: workRefSchema.nullable(),
  referenceStatus: referenceStatusSchema,
  shares: shareSetSchema,
  plays: z.number().int(),
  playedSeconds: z.number(),
  lastPlayedAt: instantSchema.nullable(),
  canEdit: z.boolean(),
})
export type RecordingView = z.infer<typeof recordingViewSchema>

export const recordingInputSchema = z.object({
  isrc: isrcSchema,
  title: textSchema('Title', 200),
  artist: textSchema('Artist', 200),
  durationSeconds: z.number().positive('A length is more than zero.').max(86_400).nullable(),
  workId: workIdSchema.nullable(),
})

export const listParties = defineEndpoint({
  id: 'listParties',
  method: 'GET',
  path: '/api/parties',
  tag,
  summary: 'Interested parties in scope',
  access: ['clerk', 'publisher', 'auditor', 'admin'],
  query: z.object({ ...pageQueryShape, search: searchQuery, sort: sortSchema(['name', 'ipi'], 'name') }),
  answer: { kind: 'json', schema: pageOf(partyViewSchema) },
})

export const getParty = defineEndpoint({
  id: 'getParty',
  method: 'GET',
  path: '/api/parties/:partyId',
  tag,
  summary: 'One interested party',
  access: catalogueReaders,
  params: z.object({ partyId: partyIdSchema }),
  answer: { kind: 'json', schema: partyViewSchema },
})

export const createParty = defineEndpoint({
  id: 'createParty',
  method: 'POST',
  path: '/api/parties',
  tag,
  summary: 'Add an interested party; a wrong IPI check is a warning, not a refusal',
  access: clerks,
  body: partyInputSchema,
  answer: { kind: 'json', schema: partyViewSchema },
})

export const updateParty = defineEndpoint({
  id: 'updateParty',
  method: 'PUT',
  path: '/api/parties/:partyId',
  tag,
  summary: 'Change an interested party',
  access: clerks,
  params: z.object({ partyId: partyIdSchema }),
  body: partyInputSchema,
  answer: { kind: 'json', schema: partyViewSchema },
})

export const listWorks = defineEndpoint({
  id: 'listWorks',
  method: 'GET',
  path: '/api/works',
  tag,
  summary: 'Works in scope',
  access: catalogueReaders,
  query: z.object({
    ...pageQueryShape,
    search: searchQuery,
    partyId: partyIdSchema.optional(),
    sort: sortSchema(['title', 'iswc'], 'title'),
  }),
  answer: { kind: 'json', schema: pageOf(workViewSchema) },
})

export const getWork = defineEndpoint({
  id: 'getWork',
  method: 'GET',
  path: '/api/works/:workId',
  tag,
  summary: 'One work with its shares and recordings',
  access: catalogueReaders,
  params: z.object({ workId: workIdSchema }),
  answer: { kind: 'json', schema: workViewSchema },
})

export const createWork = defineEndpoint({
  id: 'createWork',
  method: 'POST',
  path: '/api/works',
  tag,
  summary: 'Add a work',
  access: clerks,
  body: workInputSchema,
  answer: { kind: 'json', schema: workViewSchema },
})

export const updateWork = defineEndpoint({
  id: 'updateWork',
  method: 'PUT',
  path: '/api/works/:workId',
  tag,
  summary: 'Change a work',
  access: clerks,
  params: z.object({ workId: workIdSchema }),
  body: workInputSchema,
  answer: { kind: 'json', schema: workViewSchema },
})

export const setWorkShares = defineEndpoint({
  id: 'setWorkShares',
  method: 'PUT',
  path: '/api/works/:workId/shares',
  tag,
  summary: 'Replace the shares of a work; more than 100 % on any day is refused, less must be accepted',
  access: clerks,
  params: z.object({ workId: workIdSchema }),
  body: sharesInputSchema,
  answer: { kind: 'json', schema: workViewSchema },
})

export const listRecordings = defineEndpoint({
  id: 'listRecordings',
  method: 'GET',
  path: '/api/recordings',
  tag,
  summary: 'Recordings in scope',
  access: catalogueReaders,
  query: z.object({
    ...pageQueryShape,
    search: searchQuery,
    partyId: partyIdSchema.optional(),
    reference: referenceStatusSchema.optional(),
    sort: sortSchema(['title', 'artist', 'isrc', 'plays', 'lastPlayedAt'], 'title'),
  }),
  answer: { kind: 'json', schema: pageOf(recordingViewSchema) },
})

export const getRecording = defineEndpoint({
  id: 'getRecording',
  method: 'GET',
  path: '/api/recordings/:recordingId',
  tag,
  summary: 'One recording with its shares and play totals',
  access: catalogueReaders,
  params: z.object({ recordingId: recordingIdSchema }),
  answer: { kind: 'json', schema: recordingViewSchema },
})

export const createRecording = defineEndpoint({
  id: 'createRecording',
  method: 'POST',
  path: '/api/recordings',
  tag,
  summary: 'Add a recording; one ISRC is one recording',
  access: clerks,
  body: recordingInputSchema,
  answer: { kind: 'json', schema: recordingViewSchema },
})

export const updateRecording = defineEndpoint({
  id: 'updateRecording',
  method: 'PUT',
  path: '/api/recordings/:recordingId',
  tag,
  summary: 'Change a recording',
  access: clerks,
  params: z.object({ recordingId: recordingIdSchema }),
  body: recordingInputSchema,
  answer: { kind: 'json', schema: recordingViewSchema },
})

export const setRecordingShares = defineEndpoint({
  id: 'setRecordingShares',
  method: 'PUT',
  path: '/api/recordings/:recordingId/shares',
  tag,
  summary: 'Replace the shares of a recording; more than 100 % on any day is refused, less must be accepted',
  access: clerks,
  params: z.object({ recordingId: recordingIdSchema }),
  body: sharesInputSchema,
  answer: { kind: 'json', schema: recordingViewSchema },
})
