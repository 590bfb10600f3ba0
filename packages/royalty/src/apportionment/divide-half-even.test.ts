import { describe, expect, it } from 'vitest'
import { divideHalfEven } from './divide-half-even.ts'

describe('divideHalfEven', () => {
  // IEEE 754-2019, 4.3.1: of two equally near values the even one is taken.
  it.each([
    [25n, 10n, 2n],
    [35n, 10n, 4n],
    [-25n, 10n, -2n],
    [-35n, 10n, -4n],
    [1005n, 10n, 100n],
    [2675n, 10n, 268n],
    [125n, 10n, 12n],
    [24n, 10n, 2n],
    [26n, 10n, 3n],
    [-26n, 10n, -3n],
    [0n, 7n, 0n],
  ])('rounds %s / %s to %s', (dividend, divisor, expected) => {
    expect(divideHalfEven(dividend, divisor)).toBe(expected)
  })
})
