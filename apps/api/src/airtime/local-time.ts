import type { LocalDate, Month } from '@fieldfare/contracts'
import { localDateSchema, monthSchema } from '@fieldfare/contracts'
import { DateTime } from 'luxon'
import type { Interval } from './intervals.ts'

export type LocalDay = Interval & { day: LocalDate }

function startOf(day: string, zone: string): DateTime {
  const moment = DateTime.fromISO(day, { zone })
  if (!moment.isValid) throw new RangeError(`${day} is no day in ${zone}`)
  return moment.startOf('day')
}

/** Midnight to midnight in the zone: 23, 24 or 25 hours, or whatever the zone's rules made of it. */
export function boundsOfDay(day: LocalDate, zone: string): Interval {
  const start = startOf(day, zone)
  return { fromMs: start.toMillis(), toMs: start.plus({ days: 1 }).startOf('day').toMillis() }
}

export function daysOfMonth(month: Month, zone: string): LocalDay[] {
  const first = startOf(`${month}-01`, zone)
  return Array.from({ length: first.daysInMonth ?? 0 }, (_, index) => {
    const day = localDateSchema.parse(first.plus({ days: index }).toISODate())
    return { day, ...boundsOfDay(day, zone) }
  })
}

export function localDayOf(moment: Date | string, zone: string): LocalDate {
  return localDateSchema.parse(dateTimeOf(moment, zone).toISODate())
}

export function localMonthOf(moment: Date | string, zone: string): Month {
  return monthSchema.parse(dateTimeOf(moment, zone).toFormat('yyyy-MM'))
}

/** 2026-10-25 01:30 in the zone: how messages name a moment. */
export function describeLocal(moment: Date | string, zone: string): string {
  return dateTimeOf(moment, zone).toFormat('yyyy-MM-dd HH:mm:ss')
}

function dateTimeOf(moment: Date | string, zone: string): DateTime {
  return typeof moment === 'string'
    ? DateTime.fromISO(moment, { zone })
    : DateTime.fromJSDate(moment, { zone })
}

/** What a wall clock showing `local` in `zone` can mean. */
export type LocalTimeReading =
  | { kind: 'once'; instant: Date }
  /** Clocks went back: it was shown twice. */
  | { kind: 'twice'; earlier: Date; later: Date }
  /** Clocks went forward over it; the last second shown before and the first after, as local times. */
  | { kind: 'never'; before: string; after: string }

const LOCAL_FORMAT = "yyyy-MM-dd'T'HH:mm:ss"

/** Reads a local time and never guesses: times that exist twice or never are told apart. */
export function readLocalTime(local: string, zone: string): LocalTimeReading {
  const reading = DateTime.fromISO(local, { zone })
  const asWritten = DateTime.fromISO(local, { zone: 'UTC' })
  if (!reading.isValid || !asWritten.isValid) throw new RangeError(`${local} is no local time`)
  if (reading.toFormat(LOCAL_FORMAT) !== asWritten.toFormat(LOCAL_FORMAT)) {
    const change = offsetChangeNear(reading)
    const before = DateTime.fromMillis(change - 1000, { zone }).toFormat(LOCAL_FORMAT)
    const after = DateTime.fromMillis(change, { zone }).toFormat(LOCAL_FORMAT)
    return { kind: 'never', before, after }
  }
  const [first, second] = reading
    .getPossibleOffsets()
    .map((possible) => possible.toMillis())
    .sort((left, right) => left - right)
  if (first !== undefined && second !== undefined) {
    return { kind: 'twice', earlier: new Date(first), later: new Date(second) }
  }
  return { kind: 'once', instant: reading.toJSDate() }
}

/** The moment within a day of `moment` at which the zone's offset changes, found by halving. */
function offsetChangeNear(moment: DateTime): number {
  const offsetAt = (atMs: number) => DateTime.fromMillis(atMs, { zone: moment.zone }).offset
  let beforeMs = moment.minus({ hours: 24 }).toMillis()
  let afterMs = moment.plus({ hours: 24 }).toMillis()
  const offsetBefore = offsetAt(beforeMs)
  while (afterMs - beforeMs > 1) {
    const middleMs = Math.floor((beforeMs + afterMs) / 2)
    if (offsetAt(middleMs) === offsetBefore) beforeMs = middleMs
    else afterMs = middleMs
  }
  return afterMs
}
