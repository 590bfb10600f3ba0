import { localDateSchema, monthSchema } from '@fieldfare/contracts'
import { describe, expect, it } from 'vitest'
import { boundsOfDay, daysOfMonth, localDayOf, localMonthOf, readLocalTime } from './local-time.ts'

// Clocks in Lisbon: back at 02:00 on 2026-10-25, forward at 01:00 on 2026-03-29 (IANA time zone database).
const LISBON = 'Europe/Lisbon'
const HOUR_MS = 3_600_000

function hoursOf(day: string, zone: string): number {
  const { fromMs, toMs } = boundsOfDay(localDateSchema.parse(day), zone)
  return (toMs - fromMs) / HOUR_MS
}

describe('boundsOfDay', () => {
  it('is 24 hours as a rule, 25 when clocks go back, 23 when they go forward', () => {
    expect(hoursOf('2026-10-24', LISBON)).toBe(24)
    expect(hoursOf('2026-10-25', LISBON)).toBe(25)
    expect(hoursOf('2026-03-29', LISBON)).toBe(23)
  })

  it('holds where midnight itself is left out: Santiago begins 2026-09-06 at 01:00', () => {
    const { fromMs } = boundsOfDay(localDateSchema.parse('2026-09-06'), 'America/Santiago')
    expect(new Date(fromMs).toISOString()).toBe('2026-09-06T04:00:00.000Z')
    expect(hoursOf('2026-09-06', 'America/Santiago')).toBe(23)
  })
})

describe('daysOfMonth', () => {
  it('gives each day once, each beginning where the one before ends', () => {
    const days = daysOfMonth(monthSchema.parse('2026-10'), LISBON)
    expect(days).toHaveLength(31)
    expect(days.map(({ day }) => day).at(-1)).toBe('2026-10-31')
    for (const [index, { fromMs }] of days.entries()) {
      if (index > 0) expect(fromMs).toBe(days[index - 1]?.toMs)
    }
  })
})

describe('readLocalTime', () => {
  it('knows an hour that happened twice', () => {
    expect(readLocalTime('2026-10-25T01:30', LISBON)).toEqual({
      kind: 'twice',
      earlier: new Date('2026-10-25T00:30:00Z'),
      later: new Date('2026-10-25T01:30:00Z'),
    })
  })

  it('knows an hour that never was, and names its neighbours', () => {
    expect(readLocalTime('2026-03-29T01:30', LISBON)).toEqual({
      kind: 'never',
      before: '2026-03-29T00:59:59',
      after: '2026-03-29T02:00:00',
    })
  })

  it('reads every other time as one moment', () => {
    expect(readLocalTime('2026-07-01T06:00:05', LISBON)).toEqual({
      kind: 'once',
      instant: new Date('2026-07-01T05:00:05Z'),
    })
    expect(readLocalTime('2026-10-25T02:00', LISBON)).toEqual({
      kind: 'once',
      instant: new Date('2026-10-25T02:00:00Z'),
    })
    expect(readLocalTime('2026-03-29T02:00', LISBON)).toEqual({
      kind: 'once',
      instant: new Date('2026-03-29T01:00:00Z'),
    })
  })
})

describe('localDayOf and localMonthOf', () => {
  it('take the day of the zone, not of UTC', () => {
    expect(localDayOf('2026-10-31T23:30:00Z', 'Europe/Athens')).toBe('2026-11-01')
    expect(localMonthOf('2026-10-31T23:30:00Z', 'Europe/Athens')).toBe('2026-11')
    expect(localMonthOf(new Date('2026-11-01T02:00:00Z'), 'America/Santiago')).toBe('2026-10')
  })
})
