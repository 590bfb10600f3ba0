import { describe, expect, it } from 'vitest'
import { readDuration, readPercent } from './exact-values.ts'

describe('readPercent', () => {
  it.each([
    ['12.5', 125_000],
    ['12,5', 125_000],
    ['100', 1_000_000],
    ['100.0000', 1_000_000],
    ['33.3333', 333_333],
    ['0,0001', 1],
    ['29.57', 295_700],
    ['50 %', 500_000],
    ['12.50000', 125_000],
  ])('reads %s exactly', (cell, ppm) => {
    expect(readPercent(cell)).toEqual({ ok: true, value: ppm })
  })

  it.each(['0', '100.0001', '101', '-5', '1e2', 'half', '12.34567', '12.5.1', '1,000.5', ''])(
    'refuses %s',
    (cell) => {
      expect(readPercent(cell).ok).toBe(false)
    },
  )
})

describe('readDuration', () => {
  it.each([
    ['3:45', 225_000],
    ['1:02:03', 3_723_000],
    ['225', 225_000],
    ['225,5', 225_500],
    ['0.001', 1],
    ['75:00', 4_500_000],
  ])('reads %s', (cell, milliseconds) => {
    expect(readDuration(cell)).toEqual({ ok: true, value: milliseconds })
  })

  it.each(['3:60', '1:60:00', '0', '3m45', '99999', '-1', '1:2:3:4'])('refuses %s', (cell) => {
    expect(readDuration(cell).ok).toBe(false)
  })
})
