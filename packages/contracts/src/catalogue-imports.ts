import { z } from 'zod'
import { recordingRefSchema, referenceStatusSchema } from './catalogue.ts'
import { defineEndpoint } from './endpoint.ts'
import {
  catalogueImportIdSchema,
  instantSchema,
  pageOf,
  pageQueryShape,
  recordingIdSchema,
  referenceAudioIdSchema,
} from './primitives.ts'

const tag = 'Catalogue'
const clerks = ['clerk'] as const

/** The columns of a catalogue CSV, one row a share; rows without right and party only describe the recording. */
export const catalogueCsvColumns = [
  'isrc',
  'title',
  'artist',
  'duration',
  'work_iswc',
  'work_title',
  'right',
  'party_ipi',
  'party_name',
  'share_percent',
  'valid_from',
  'valid_to',
] as const

export const importRowOutcomeSchema = z.enum(['created', 'updated', 'unchanged', 'refused'])

export const catalogueImportViewSchema = z.object({
  id: catalogueImportIdSchema,
  fileName: z.string(),
  importedByName: z.string(),
  importedAt: instantSchema,
  rows: z.number().int(),
  created: z.number().int(),
  updated: z.number().int(),
  unchanged: z.number().int(),
  refused: z.number().int(),
  warnings: z.number().int(),
})
export type CatalogueImportView = z.infer<typeof catalogueImportViewSchema>

export const importRowSchema = z.object({
  /** Line in the file, the header being line 1. */
  line: z.number().int(),
  isrc: z.string(),
  title: z.string(),
  outcome: importRowOutcomeSchema,
  messages: z.array(z.string()),
})

export const importCatalogue = defineEndpoint({
  id: 'importCatalogue',
  method: 'POST',
  path: '/api/catalogue/imports',
  tag,
  summary:
    'Import recordings, works, parties and shares from CSV (UTF-8, one row a share), with a report per row',
  access: clerks,
  file: { field: 'file', description: `CSV with the columns ${catalogueCsvColumns.join(', ')}` },
  answer: { kind: 'json', schema: catalogueImportViewSchema },
})

export const listCatalogueImports = defineEndpoint({
  id: 'listCatalogueImports',
  method: 'GET',
  path: '/api/catalogue/imports',
  tag,
  summary: 'Imports, newest first',
  access: ['clerk', 'auditor'],
  query: z.object(pageQueryShape),
  answer: { kind: 'json', schema: pageOf(catalogueImportViewSchema) },
})

const importParams = z.object({ importId: catalogueImportIdSchema })

export const getCatalogueImport = defineEndpoint({
  id: 'getCatalogueImport',
  method: 'GET',
  path: '/api/catalogue/imports/:importId',
  tag,
  summary: 'One import',
  access: ['clerk', 'auditor'],
  params: importParams,
  answer: { kind: 'json', schema: catalogueImportViewSchema },
})

export const listCatalogueImportRows = defineEndpoint({
  id: 'listCatalogueImportRows',
  method: 'GET',
  path: '/api/catalogue/imports/:importId/rows',
  tag,
  summary: 'The report of an import, row by row',
  access: ['clerk', 'auditor'],
  params: importParams,
  query: z.object({ ...pageQueryShape, outcome: importRowOutcomeSchema.optional() }),
  answer: { kind: 'json', schema: pageOf(importRowSchema) },
})

export const exportCatalogueImportRows = defineEndpoint({
  id: 'exportCatalogueImportRows',
  method: 'GET',
  path: '/api/catalogue/imports/:importId/rows.csv',
  tag,
  summary: 'The report of an import as CSV',
  access: ['clerk', 'auditor'],
  params: importParams,
  query: z.object({ outcome: importRowOutcomeSchema.optional() }),
  answer: { kind: 'file', mediaTypes: ['text/csv'] },
})

export const referenceAudioViewSchema = z.object({
  id: referenceAudioIdSchema,
  recording: recordingRefSchema,
  fileName: z.string(),
  sizeBytes: z.number(),
  format: z.string().nullable(),
  durationSeconds: z.number().nullable(),
  status: referenceStatusSchema.exclude(['none']),
  /** In plain words, when status is failed. */
  failure: z.string().nullable(),
  landmarkHashes: z.number().int().nullable(),
  uploadedAt: instantSchema,
  uploadedByName: z.string(),
})
export type ReferenceAudioView = z.infer<typeof referenceAudioViewSchema>

export const uploadReferenceAudio = defineEndpoint({
  id: 'uploadReferenceAudio',
  method: 'POST',
  path: '/api/reference-audio',
  tag,
  summary: 'Send reference audio; without recordingId the ISRC is read from the file name',
  access: clerks,
  body: z.object({ recordingId: recordingIdSchema.optional() }),
  file: { field: 'file', description: 'MP3, WAV, FLAC, Ogg (Vorbis or Opus), M4A or AAC' },
  answer: { kind: 'json', schema: referenceAudioViewSchema },
})

export const listReferenceAudio = defineEndpoint({
  id: 'listReferenceAudio',
  method: 'GET',
  path: '/api/reference-audio',
  tag,
  summary: 'Reference audio with its fingerprinting state, newest first',
  access: ['clerk', 'auditor'],
  query: z.object({
    ...pageQueryShape,
    status: referenceStatusSchema.exclude(['none']).optional(),
    recordingId: recordingIdSchema.optional(),
  }),
  answer: { kind: 'json', schema: pageOf(referenceAudioViewSchema) },
})

export const retryReferenceAudio = defineEndpoint({
  id: 'retryReferenceAudio',
  method: 'POST',
  path: '/api/reference-audio/:referenceAudioId/retry',
  tag,
  summary: 'Fingerprint again after a failure',
  access: clerks,
  params: z.object({ referenceAudioId: referenceAudioIdSchema }),
  answer: { kind: 'json', schema: referenceAudioViewSchema },
})
