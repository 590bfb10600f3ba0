import type { LogUpload } from '@fieldfare/contracts'
import { readLocalTime } from '../../airtime/local-time.ts'
import { AppError, fieldRefused } from '../../http/app-error.ts'

function localTimeInvalid(path: string, message: string): AppError {
  return new AppError('local-time-invalid', { detail: message, fieldErrors: [{ path, message }] })
}

const spoken = (local: string) => local.replace('T', ' ')

/**
 * The moment a log begins, from what a wall clock showed. Where clocks changed it is asked, never guessed.
 *
 * @throws AppError local-time-invalid, validation-failed
 */
export function readLogStart(upload: LogUpload, now: Date): Date {
  const { startedAtLocal, timeZone } = upload
  const reading = readLocalTime(startedAtLocal, timeZone)
  if (reading.kind === 'never') {
    throw localTimeInvalid(
      'startedAtLocal',
      `${spoken(startedAtLocal)} never happened in ${timeZone}: clocks went from ${spoken(reading.before)} straight to ${spoken(reading.after)}. Give a time up to the first or from the second.`,
    )
  }
  if (reading.kind === 'twice' && upload.occurrence === undefined) {
    throw localTimeInvalid(
      'occurrence',
      `${spoken(startedAtLocal)} happened twice in ${timeZone}, since clocks went back: ${reading.earlier.toISOString()} and ${reading.later.toISOString()}. Say which of the two it was, the earlier or the later.`,
    )
  }
  const instant =
    reading.kind === 'once'
      ? reading.instant
      : upload.occurrence === 'earlier'
        ? reading.earlier
        : reading.later
  if (instant.getTime() > now.getTime()) {
    throw fieldRefused(
      'startedAtLocal',
      'A log cannot begin in the future. Check the date, the time and the time zone.',
    )
  }
  return instant
}
