import { DateTime } from 'luxon'

// Year, month, day, then hour and minute and perhaps seconds, with or without separators, not part of a longer
// number: 2026-11-03_06-00, 20261103T060000, 2026.11.03 06h00.
const pattern =
  /(?<!\d)(20\d{2})([-_.]?)(\d{2})\2(\d{2})[T _-]{1,3}(\d{2})[-_.:h]?(\d{2})(?:[-_.:m]?(\d{2}))?(?!\d)(Z?)/gi

/**
 * The start a file name plainly states, as a local date-time without a zone. Null where it states none, more than
 * one, one that is no date, or one in UTC, which the station's clock did not show.
 */
export function localTimeInFileName(fileName: string): string | null {
  const matches = [...fileName.matchAll(pattern)]
  const [match] = matches
  if (match === undefined || matches.length > 1) return null
  const [, year, , month, day, hour, minute, second = '00', utc] = match
  if (utc !== '') return null
  const text = `${year ?? ''}-${month ?? ''}-${day ?? ''}T${hour ?? ''}:${minute ?? ''}:${second}`
  return DateTime.fromISO(text, { zone: 'utc' }).isValid ? text : null
}
