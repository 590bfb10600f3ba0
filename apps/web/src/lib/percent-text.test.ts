import { describe, expect, it } from 'vitest'
import { percentToPpm, ppmToPercent } from './percent-text.ts'

describe('percentToPpm', () => {
  it.each([
    ['12.5', 125_000],
    ['12,5 %', 125_000],
    ['33.3333', 333_333],
    ['16.67', 166_700],
    ['0.0001', 1],
    ['100', 1_000_000],
    ['100.0000', 1_000_000],
    ['7.10000', 71_000],
  ])('reads %s', (text, ppm) => {
    expect(percentToPpm(text)).toBe(ppm)
  })

  it.each(['', 'half', '12.34567', '100.0001', '-5', '1e1', '12.5.1'])('refuses %s', (text) => {
    expect(percentToPpm(text)).toBeNull()
  })

  it('goes there and back for every ten-thousandth of a per cent of a stretch where floats round', () => {
    for (let ppm = 280_000; ppm <= 300_000; ppm += 1) expect(percentToPpm(ppmToPercent(ppm))).toBe(ppm)
  })
})
