import { describe, expect, it } from 'vitest'
import { formatCoverage, formatDuration, formatPercent, formatPeriod } from './statement-words.ts'

describe('statement words', () => {
  it.each([
    [1_000_000, '100\u00a0%'],
    [333_333, '33.3333\u00a0%'],
    [62_500, '6.25\u00a0%'],
    [1, '0.0001\u00a0%'],
    [0, '0\u00a0%'],
  ])('writes %i parts per million as %s', (ppm, text) => {
    expect(formatPercent(ppm)).toBe(text)
  })

  it.each([
    [0, '0:00'],
    [59.999, '0:59'],
    [185, '3:05'],
    [7500, '125:00'],
  ])('writes %d seconds as %s', (seconds, text) => {
    expect(formatDuration(seconds)).toBe(text)
  })

  it('says 100 % only of a month that is held in full', () => {
    expect(formatCoverage(2_591_999, 2_592_000)).toBe('99.9\u00a0%')
    expect(formatCoverage(2_592_000, 2_592_000)).toBe('100.0\u00a0%')
    expect(formatCoverage(0, 2_592_000)).toBe('0.0\u00a0%')
    expect(formatCoverage(0, 0)).toBe('none due')
  })

  it('writes a period within a month once, and across months in full', () => {
    expect(formatPeriod('2026-11-01', '2026-11-30')).toBe('1 to 30 November 2026')
    expect(formatPeriod('2026-11-16', '2026-12-15')).toBe('16 November 2026 to 15 December 2026')
  })
})
