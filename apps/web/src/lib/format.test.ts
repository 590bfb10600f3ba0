import { describe, expect, it } from 'vitest'
import { formatBytes, formatDuration, formatHours, formatPpm, formatRemaining } from './format.ts'
import { formatMoney, parseMoney } from './format-money.ts'
import {
  currentMonth,
  formatClock,
  formatDay,
  formatInstant,
  formatMonth,
  formatZone,
  shiftMonth,
} from './format-time.ts'

describe('formatDuration', () => {
  it.each([
    [0, '0:00'],
    [59.99, '0:59'],
    [60, '1:00'],
    [754.2, '12:34'],
    [3725, '62:05'],
    [-61, '\u22121:01'],
    [-0.4, '0:00'],
  ])('shows %d seconds as %s', (seconds, text) => {
    expect(formatDuration(seconds)).toBe(text)
  })
})

describe('formatMoney', () => {
  it.each([
    ['0', 'EUR', 2, '€\u202f0.00'],
    ['5', 'EUR', 2, '€\u202f0.05'],
    ['123456789', 'EUR', 2, '€\u202f1,234,567.89'],
    ['-1234', 'EUR', 2, '\u2212€\u202f12.34'],
    ['1234', 'JPY', 0, '¥\u202f1,234'],
    ['1234', 'BHD', 3, 'BHD\u202f1.234'],
  ])('shows %s minor units of %s', (minor, currency, digits, text) => {
    expect(formatMoney(minor, currency, digits)).toBe(text)
  })

  it('keeps every digit of an amount beyond the safe integers', () => {
    expect(formatMoney('900719925474099312', 'EUR', 2)).toBe('€\u202f9,007,199,254,740,993.12')
  })
})

describe('parseMoney', () => {
  it.each([
    ['1,234.5', '123450'],
    ['12', '1200'],
    ['\u22120.05', '-5'],
    ['1 234.50', '123450'],
    ['12,345,678.90', '1234567890'],
  ])('reads %s', (text, minor) => {
    expect(parseMoney(text, 2)).toBe(minor)
  })

  it.each(['', '1.234', '12a', '--1', '.5', '1200,50', '1,5', '12,34,567', '1,23'])('refuses %s', (text) => {
    expect(parseMoney(text, 2)).toBeNull()
  })
})

describe('times', () => {
  it('shows station-local time on both sides of a clock change', () => {
    // Lisbon left summer time on 25 October 2026 at 01:00 UTC (IANA tz database, EU rule).
    expect(formatClock('2026-10-25T00:30:00Z', 'Europe/Lisbon', 'minute')).toBe('01:30')
    expect(formatClock('2026-10-25T01:30:00Z', 'Europe/Lisbon', 'minute')).toBe('01:30')
    expect(formatZone('2026-10-25T00:30:00Z', 'Europe/Lisbon')).not.toBe(
      formatZone('2026-10-25T01:30:00Z', 'Europe/Lisbon'),
    )
  })

  it('writes midnight as 00', () => {
    expect(formatInstant('2026-11-29T00:00:05Z', 'Europe/Lisbon', 'second')).toBe('29 Nov 2026, 00:00:05')
  })

  it('names days and months', () => {
    expect(formatDay('2026-11-29')).toBe('Sun, 29 Nov 2026')
    expect(formatMonth('2026-11')).toBe('November 2026')
  })

  it('steps over the turn of a year', () => {
    expect(shiftMonth('2026-12', 1)).toBe('2027-01')
    expect(shiftMonth('2026-01', -1)).toBe('2025-12')
  })

  it('takes the month of the zone, not of UTC', () => {
    expect(currentMonth('America/Halifax', new Date('2026-12-01T02:00:00Z'))).toBe('2026-11')
  })
})

describe('sizes and parts', () => {
  it('shows them with their units', () => {
    expect(formatBytes(999)).toBe('999\u00a0bytes')
    expect(formatBytes(1_500_000)).toBe('1.5\u00a0MB')
    expect(formatPpm(125_000)).toBe('12.5\u202f%')
    expect(formatHours(45_240)).toBe('12\u00a0h 34\u00a0min')
    expect(formatRemaining(61)).toBe('2 minutes')
    expect(formatRemaining(42)).toBe('45 seconds')
  })
})
