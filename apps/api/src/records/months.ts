import type { Month } from '@fieldfare/contracts'
import { DateTime } from 'luxon'

/** First day of a month and first day of the next, YYYY-MM-DD. */
export type MonthDays = { firstDay: string; nextFirstDay: string; lastDay: string }

export function daysOfMonth(month: Month): MonthDays {
  const first = DateTime.fromISO(`${month}-01`, { zone: 'utc' })
  const next = first.plus({ months: 1 })
  return {
    firstDay: first.toFormat('yyyy-MM-dd'),
    nextFirstDay: next.toFormat('yyyy-MM-dd'),
    lastDay: next.minus({ days: 1 }).toFormat('yyyy-MM-dd'),
  }
}

/** A month as people say it: October 2026. */
export function monthInWords(month: Month): string {
  return DateTime.fromISO(`${month}-01`, { zone: 'utc', locale: 'en' }).toFormat('LLLL yyyy')
}
