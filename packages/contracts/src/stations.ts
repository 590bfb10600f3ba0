import { z } from 'zod'
import { defineEndpoint } from './endpoint.ts'
import {
  amountMinorTextSchema,
  instantSchema,
  licenceIdSchema,
  localDateSchema,
  monthSchema,
  partsPerMillionSchema,
  playIdSchema,
  detectionIdSchema,
  stationIdSchema,
  stationLogIdSchema,
  textSchema,
  timeZoneSchema,
} from './primitives.ts'

const tag = 'Stations'
const stationReaders = ['uploader', 'clerk', 'auditor', 'admin'] as const

export const licenceViewSchema = z.object({
  id: licenceIdSchema,
  validFrom: localDateSchema,
  /** Last day covered, null while open-ended. */
  validTo: localDateSchema.nullable(),
  monthlyFeeMinor: amountMinorTextSchema,
  /** Part of the net fee that goes to works; the rest goes to recordings. */
  worksPartPpm: partsPerMillionSchema,
})
export type LicenceView = z.infer<typeof licenceViewSchema>

export const stationViewSchema = z.object({
  id: stationIdSchema,
  callName: z.string(),
  name: z.string(),
  timeZone: timeZoneSchema,
  contactEmail: z.string().nullable(),
  licences: z.array(licenceViewSchema),
  canUpload: z.boolean(),
  canEdit: z.boolean(),
})
export type StationView = z.infer<typeof stationViewSchema>

export const stationInputSchema = z.object({
  callName: z
    .string()
    .trim()
    .toUpperCase()
    .regex(/^[A-Z0-9-]{2,12}$/, 'Use 2 to 12 letters, figures or hyphens.'),
  name: textSchema('Name', 120),
  timeZone: timeZoneSchema,
  contactEmail: z.union([z.literal('').transform(() => null), z.email('Enter an e-mail address.'), z.null()]),
})

export const licenceInputSchema = z
  .object({
    validFrom: localDateSchema,
    validTo: localDateSchema.nullable(),
    monthlyFeeMinor: amountMinorTextSchema.refine(
      (text) => !text.startsWith('-'),
      'A fee cannot be negative.',
    ),
    worksPartPpm: partsPerMillionSchema,
  })
  .refine((licence) => licence.validTo === null || licence.validTo >= licence.validFrom, {
    path: ['validTo'],
    error: 'The last day is before the first.',
  })

const stationParams = z.object({ stationId: stationIdSchema })

export const listStations = defineEndpoint({
  id: 'listStations',
  method: 'GET',
  path: '/api/stations',
  tag,
  summary: 'Stations in scope',
  access: stationReaders,
  answer: { kind: 'json', schema: z.object({ items: z.array(stationViewSchema) }) },
})

export const getStation = defineEndpoint({
  id: 'getStation',
  method: 'GET',
  path: '/api/stations/:stationId',
  tag,
  summary: 'One station with its licences',
  access: stationReaders,
  params: stationParams,
  answer: { kind: 'json', schema: stationViewSchema },
})

export const createStation = defineEndpoint({
  id: 'createStation',
  method: 'POST',
  path: '/api/stations',
  tag,
  summary: 'Add a station',
  access: ['admin'],
  body: stationInputSchema,
  answer: { kind: 'json', schema: stationViewSchema },
})

export const updateStation = defineEndpoint({
  id: 'updateStation',
  method: 'PUT',
  path: '/api/stations/:stationId',
  tag,
  summary: 'Change a station; its time zone is fixed once logs are held',
  access: ['admin'],
  params: stationParams,
  body: stationInputSchema,
  answer: { kind: 'json', schema: stationViewSchema },
})

export const createLicence = defineEndpoint({
  id: 'createLicence',
  method: 'POST',
  path: '/api/stations/:stationId/licences',
  tag,
  summary: 'Add a licence; licences of one station never overlap',
  access: ['admin'],
  params: stationParams,
  body: licenceInputSchema,
  answer: { kind: 'json', schema: stationViewSchema },
})

export const updateLicence = defineEndpoint({
  id: 'updateLicence',
  method: 'PUT',
  path: '/api/licences/:licenceId',
  tag,
  summary: 'Change a licence',
  access: ['admin'],
  params: z.object({ licenceId: licenceIdSchema }),
  body: licenceInputSchema,
  answer: { kind: 'json', schema: stationViewSchema },
})

/** What a stretch of airtime is, as drawn on the airtime ribbon. */
export const airtimeKindSchema = z.enum([
  'held',
  'music',
  'speech',
  'silence',
  'play',
  'review',
  'unidentified',
])
export type AirtimeKind = z.infer<typeof airtimeKindSchema>

export const airtimeSpanSchema = z.object({
  kind: airtimeKindSchema,
  from: instantSchema,
  to: instantSchema,
  label: z.string().nullable(),
  logId: stationLogIdSchema.nullable(),
  detectionId: detectionIdSchema.nullable(),
  playId: playIdSchema.nullable(),
})
export type AirtimeSpan = z.infer<typeof airtimeSpanSchema>

export const getStationDay = defineEndpoint({
  id: 'getStationDay',
  method: 'GET',
  path: '/api/stations/:stationId/days/:day',
  tag,
  summary: 'One station-local day of airtime: what is held, what was heard',
  access: stationReaders,
  params: z.object({ stationId: stationIdSchema, day: localDateSchema }),
  answer: {
    kind: 'json',
    schema: z.object({
      day: localDateSchema,
      timeZone: timeZoneSchema,
      /** Midnight to midnight in the station's zone: 23, 24 or 25 hours. */
      from: instantSchema,
      to: instantSchema,
      heldSeconds: z.number(),
      musicSeconds: z.number(),
      identifiedSeconds: z.number(),
      spans: z.array(airtimeSpanSchema),
    }),
  },
})

export const getStationMonth = defineEndpoint({
  id: 'getStationMonth',
  method: 'GET',
  path: '/api/stations/:stationId/months/:month',
  tag,
  summary: 'A month of a station, a thin ribbon a day',
  access: stationReaders,
  params: z.object({ stationId: stationIdSchema, month: monthSchema }),
  answer: {
    kind: 'json',
    schema: z.object({
      month: monthSchema,
      timeZone: timeZoneSchema,
      days: z.array(
        z.object({
          day: localDateSchema,
          from: instantSchema,
          to: instantSchema,
          heldSeconds: z.number(),
          identifiedSeconds: z.number(),
          plays: z.number().int(),
          /** Neighbouring spans of one kind are joined, since a thin ribbon cannot show them apart. */
          spans: z.array(z.object({ kind: airtimeKindSchema, from: instantSchema, to: instantSchema })),
        }),
      ),
    }),
  },
})
