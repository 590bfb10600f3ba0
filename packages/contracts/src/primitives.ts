import { z } from 'zod'

export const societyIdSchema = z.uuid().brand<'SocietyId'>()
export const userIdSchema = z.uuid().brand<'UserId'>()
export const sessionIdSchema = z.uuid().brand<'SessionId'>()
export const stationIdSchema = z.uuid().brand<'StationId'>()
export const licenceIdSchema = z.uuid().brand<'LicenceId'>()
export const partyIdSchema = z.uuid().brand<'PartyId'>()
export const workIdSchema = z.uuid().brand<'WorkId'>()
export const recordingIdSchema = z.uuid().brand<'RecordingId'>()
export const shareIdSchema = z.uuid().brand<'ShareId'>()
export const referenceAudioIdSchema = z.uuid().brand<'ReferenceAudioId'>()
export const stationLogIdSchema = z.uuid().brand<'StationLogId'>()
export const analysisIdSchema = z.uuid().brand<'AnalysisId'>()
export const detectionIdSchema = z.uuid().brand<'DetectionId'>()
export const playIdSchema = z.uuid().brand<'PlayId'>()
export const distributionIdSchema = z.uuid().brand<'DistributionId'>()
export const statementIdSchema = z.uuid().brand<'StatementId'>()
export const disputeIdSchema = z.uuid().brand<'DisputeId'>()
export const jobIdSchema = z.uuid().brand<'JobId'>()
export const catalogueImportIdSchema = z.uuid().brand<'CatalogueImportId'>()
export const mailMessageIdSchema = z.uuid().brand<'MailMessageId'>()

export type UserId = z.infer<typeof userIdSchema>
export type SessionId = z.infer<typeof sessionIdSchema>
export type StationId = z.infer<typeof stationIdSchema>
export type LicenceId = z.infer<typeof licenceIdSchema>
export type PartyId = z.infer<typeof partyIdSchema>
export type WorkId = z.infer<typeof workIdSchema>
export type RecordingId = z.infer<typeof recordingIdSchema>
export type ShareId = z.infer<typeof shareIdSchema>
export type ReferenceAudioId = z.infer<typeof referenceAudioIdSchema>
export type StationLogId = z.infer<typeof stationLogIdSchema>
export type AnalysisId = z.infer<typeof analysisIdSchema>
export type DetectionId = z.infer<typeof detectionIdSchema>
export type PlayId = z.infer<typeof playIdSchema>
export type DistributionId = z.infer<typeof distributionIdSchema>
export type StatementId = z.infer<typeof statementIdSchema>
export type DisputeId = z.infer<typeof disputeIdSchema>
export type JobId = z.infer<typeof jobIdSchema>
export type CatalogueImportId = z.infer<typeof catalogueImportIdSchema>
export type MailMessageId = z.infer<typeof mailMessageIdSchema>

/** A moment in time: ISO 8601 with an offset; the server always sends UTC ('Z'). */
export const instantSchema = z.iso.datetime({ offset: true }).brand<'Instant'>()
export type Instant = z.infer<typeof instantSchema>

/** A calendar day without a zone, YYYY-MM-DD. */
export const localDateSchema = z.iso.date().brand<'LocalDate'>()
export type LocalDate = z.infer<typeof localDateSchema>

/** A wall-clock date and time without a zone, YYYY-MM-DDTHH:mm[:ss]; meaningful only beside a time zone. */
export const localDateTimeSchema = z.iso
  .datetime({ local: true, offset: false, error: 'Enter a date and time, for example 2026-11-29T06:00.' })
  .brand<'LocalDateTime'>()
export type LocalDateTime = z.infer<typeof localDateTimeSchema>

/** A calendar month of distribution, YYYY-MM, in station-local time. */
export const monthSchema = z
  .string()
  .regex(/^\d{4}-(0[1-9]|1[0-2])$/, 'Enter a month as YYYY-MM.')
  .brand<'Month'>()
export type Month = z.infer<typeof monthSchema>

function isKnownTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name })
    return true
  } catch {
    return false
  }
}

/** An IANA time zone name known to this runtime, for example Europe/Lisbon. */
export const timeZoneSchema = z
  .string()
  .min(1, 'Choose a time zone.')
  .refine(isKnownTimeZone, 'This is not a known IANA time zone.')

/** An amount in the currency's minor unit, as a decimal string: JSON has no integers beyond 2^53. */
export const amountMinorTextSchema = z
  .string()
  .regex(/^-?\d{1,18}$/, 'An amount is a whole number of minor units.')
  .brand<'AmountMinorText'>()
export type AmountMinorText = z.infer<typeof amountMinorTextSchema>

/** ISO 4217 alphabetic currency code. */
export const currencySchema = z
  .string()
  .regex(/^[A-Z]{3}$/)
  .brand<'Currency'>()
export type Currency = z.infer<typeof currencySchema>

/** Parts per million of a whole, 0 to 1,000,000; 12.5 % is 125,000. */
export const partsPerMillionSchema = z.number().int().min(0).max(1_000_000)

/** A line of text a person typed: trimmed, never empty, bounded, no control characters. */
export function textSchema(label: string, maximumLength: number) {
  return z
    .string({ error: `${label} is needed.` })
    .trim()
    .min(1, `${label} is needed.`)
    .max(maximumLength, `${label} may have at most ${maximumLength} characters.`)
    .refine(
      (text) => !/\p{Cc}/u.test(text.replaceAll('\n', ' ')),
      `${label} contains characters that cannot be shown.`,
    )
}

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .pipe(z.email('Enter an e-mail address such as name@example.org.'))

/** Query-string booleans: only the words true and false. */
export const queryBooleanSchema = z.enum(['true', 'false']).transform((word) => word === 'true')

export const pageQueryShape = {
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
}

/** One page of a list, with the number of rows in the whole of it. */
export function pageOf<Item extends z.ZodType>(item: Item) {
  return z.object({
    items: z.array(item),
    total: z.number().int().min(0),
    page: z.number().int().min(1),
    pageSize: z.number().int().min(1),
  })
}

/** Sort order in a query string: a column, or the column behind '-' for descending. */
export function sortSchema<const Columns extends readonly [string, ...string[]]>(
  columns: Columns,
  initial: Columns[number] | `-${Columns[number]}`,
) {
  const allowed: readonly string[] = columns.flatMap((column) => [column, `-${column}`])
  return z
    .string()
    .default(initial)
    .refine((value) => allowed.includes(value), `Sort by one of: ${columns.join(', ')}.`)
}
