import { DateTime } from 'luxon'
import { type StatementDocument, type StatementRight } from './statement-document.ts'

/** A rate or share in per cent, exact to the part per million, without trailing zeros: `33.3333 %`. */
export function formatPercent(ppm: number): string {
  return `${formatPercentFigure(ppm)}\u00a0%`
}

/** As {@link formatPercent}, the figure alone. */
export function formatPercentFigure(ppm: number): string {
  const fraction = (ppm % 10_000).toString().padStart(4, '0').replace(/0+$/, '')
  const whole = Math.floor(ppm / 10_000)
  return fraction ? `${whole}.${fraction}` : `${whole}`
}

/** Whole seconds as minutes and seconds: `3:05`, `125:00`. Parts of a second are dropped. */
export function formatDuration(seconds: number): string {
  const whole = Math.floor(seconds)
  return `${Math.floor(whole / 60)}:${(whole % 60).toString().padStart(2, '0')}`
}

/** A day as it is written in a letter: `3 November 2026`. */
export function formatDay(day: string): string {
  return DateTime.fromISO(day, { zone: 'utc' }).setLocale('en-GB').toFormat('d MMMM yyyy')
}

/** A period as it is written in a letter: `1 to 30 November 2026`, or both days in full where the months differ. */
export function formatPeriod(firstDay: string, lastDay: string): string {
  const sameMonth = firstDay.slice(0, 7) === lastDay.slice(0, 7)
  return `${sameMonth ? Number(firstDay.slice(8)) : formatDay(firstDay)} to ${formatDay(lastDay)}`
}

/** How much of a station's month is held as logs, in per cent with one decimal, rounded down so that 100 % means all. */
export function formatCoverage(heldSeconds: number, expectedSeconds: number): string {
  if (expectedSeconds <= 0) return 'none due'
  const tenths = Math.floor(Math.min(1, heldSeconds / expectedSeconds) * 1000)
  return `${Math.floor(tenths / 10)}.${tenths % 10}\u00a0%`
}

export function nameRight(right: StatementRight): string {
  return right === 'works' ? 'Work' : 'Recording'
}

/** What a payee must know about the standing of the figures. */
export const CAUTION =
  'This statement is computed from the evidence of what was broadcast and from the society’s own rules. It is not ' +
  'legal or tax advice. Contracts, local law and the society’s distribution rules prevail.'

export const HOLDBACK_WORDS =
  'These are whole amounts kept apart on works and recordings in which you have a share. They have been paid to ' +
  'nobody, and are released when the reason is settled.'

export const COVERAGE_WORDS =
  'Log coverage is the part of a station’s month for which the society holds a recording of the broadcast. The month ' +
  'is divided over the plays found in what is held; nothing is estimated for what is missing.'

/** How, where and until when the statement can be questioned. */
export function questionWords(statement: StatementDocument): string {
  const until = statement.questionUntil
    ? `until ${formatDay(statement.questionUntil)}`
    : 'from the day it is issued'
  return (
    `You can question any line or play ${until}: ${statement.questionContact}. Give the statement number and ` +
    'the number of the line or play. You will get a decision in writing, with its reason. What is corrected appears ' +
    'as an adjustment on a later statement; this one is not changed.'
  )
}
