import { z } from 'zod'
import { holdbackViewSchema, namedDeductionSchema } from './distributions.ts'
import { defineEndpoint } from './endpoint.ts'
import { stationRefSchema } from './logs.ts'
import { playViewSchema } from './plays.ts'
import {
  amountMinorTextSchema,
  currencySchema,
  instantSchema,
  localDateSchema,
  monthSchema,
  pageOf,
  pageQueryShape,
  partsPerMillionSchema,
  partyIdSchema,
  sortSchema,
  statementIdSchema,
} from './primitives.ts'
import { rightSchema } from './shares.ts'

const tag = 'Statements'
const statementReaders = ['clerk', 'publisher', 'auditor'] as const

export const statementSummarySchema = z.object({
  id: statementIdSchema,
  number: z.string(),
  month: monthSchema,
  party: z.object({ id: partyIdSchema, name: z.string(), ipi: z.string().nullable() }),
  currency: currencySchema,
  currencyDigits: z.number().int(),
  netMinor: amountMinorTextSchema,
  status: z.enum(['draft', 'issued']),
  issuedAt: instantSchema.nullable(),
  /** The PDF is made when the statement is issued. */
  hasPdf: z.boolean(),
})
export type StatementSummary = z.infer<typeof statementSummarySchema>

export const statementViewSchema = statementSummarySchema.extend({
  periodFrom: localDateSchema,
  periodTo: localDateSchema,
  ruleVersion: z.string(),
  grossMinor: amountMinorTextSchema,
  deductions: z.array(namedDeductionSchema),
  rights: z.array(z.object({ right: rightSchema, netMinor: amountMinorTextSchema })),
  stations: z.array(
    z.object({
      station: stationRefSchema,
      netMinor: amountMinorTextSchema,
      heldSeconds: z.number(),
      expectedSeconds: z.number(),
    }),
  ),
  holdbacks: z.array(holdbackViewSchema),
  lines: z.number().int(),
})
export type StatementView = z.infer<typeof statementViewSchema>

export const statementLineSchema = z.object({
  lineNumber: z.number().int(),
  right: rightSchema,
  station: stationRefSchema,
  title: z.string(),
  artist: z.string(),
  /** ISRC or ISWC, compact. */
  code: z.string().nullable(),
  plays: z.number().int(),
  creditedSeconds: z.number(),
  sharePpm: partsPerMillionSchema,
  amountMinor: amountMinorTextSchema,
})
export type StatementLine = z.infer<typeof statementLineSchema>

export const listStatements = defineEndpoint({
  id: 'listStatements',
  method: 'GET',
  path: '/api/statements',
  tag,
  summary: 'Statements in scope; a publisher sees those issued to their parties',
  access: statementReaders,
  query: z.object({
    ...pageQueryShape,
    month: monthSchema.optional(),
    partyId: partyIdSchema.optional(),
    search: z.string().trim().max(100).optional(),
    sort: sortSchema(['month', 'party', 'netMinor', 'number'], '-month'),
  }),
  answer: { kind: 'json', schema: pageOf(statementSummarySchema) },
})

const statementParams = z.object({ statementId: statementIdSchema })

export const getStatement = defineEndpoint({
  id: 'getStatement',
  method: 'GET',
  path: '/api/statements/:statementId',
  tag,
  summary: 'One statement: amounts by right and station, every deduction by name, holdbacks',
  access: statementReaders,
  params: statementParams,
  answer: { kind: 'json', schema: statementViewSchema },
})

export const listStatementLines = defineEndpoint({
  id: 'listStatementLines',
  method: 'GET',
  path: '/api/statements/:statementId/lines',
  tag,
  summary: 'The lines of a statement',
  access: statementReaders,
  params: statementParams,
  query: z.object({
    ...pageQueryShape,
    right: rightSchema.optional(),
    search: z.string().trim().max(100).optional(),
    sort: sortSchema(['lineNumber', 'title', 'plays', 'creditedSeconds', 'amountMinor'], 'lineNumber'),
  }),
  answer: { kind: 'json', schema: pageOf(statementLineSchema) },
})

export const listStatementLinePlays = defineEndpoint({
  id: 'listStatementLinePlays',
  method: 'GET',
  path: '/api/statements/:statementId/lines/:lineNumber/plays',
  tag,
  summary: 'The plays behind one line',
  access: statementReaders,
  params: z.object({ statementId: statementIdSchema, lineNumber: z.coerce.number().int().min(1) }),
  query: z.object(pageQueryShape),
  answer: { kind: 'json', schema: pageOf(playViewSchema) },
})

export const getStatementPdf = defineEndpoint({
  id: 'getStatementPdf',
  method: 'GET',
  path: '/api/statements/:statementId/statement.pdf',
  tag,
  summary: 'The issued statement as PDF',
  access: statementReaders,
  params: statementParams,
  answer: { kind: 'file', mediaTypes: ['application/pdf'] },
})

export const getStatementCsv = defineEndpoint({
  id: 'getStatementCsv',
  method: 'GET',
  path: '/api/statements/:statementId/statement.csv',
  tag,
  summary: 'The issued statement as CSV; agrees with the PDF to the unit',
  access: statementReaders,
  params: statementParams,
  answer: { kind: 'file', mediaTypes: ['text/csv'] },
})
