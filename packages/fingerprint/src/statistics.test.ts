import { describe, expect, it } from 'vitest'
import { logGamma, logOverdispersedTail, logPoissonTail } from './statistics.ts'

describe('log gamma', () => {
  it.each([
    [1, 0],
    [5, Math.log(24)],
    [0.5, Math.log(Math.sqrt(Math.PI))],
    [101, 363.739375555563],
  ])('of %d', (x, expected) => {
    // The last value is ln 100!, Abramowitz and Stegun, table 6.4 (from memory).
    expect(logGamma(x)).toBeCloseTo(expected, 9)
  })
})

describe('Poisson tail', () => {
  it('agrees with the sum of its terms', () => {
    for (const mean of [0.01, 0.5, 2, 30]) {
      for (const count of [1, 3, 10, 40]) {
        let term = Math.exp(-mean)
        let sum = 0
        for (let k = 0; k < 400; k++) {
          if (k >= count) sum += term
          term *= mean / (k + 1)
        }
        expect(logPoissonTail(count, mean)).toBeCloseTo(Math.log(sum), 8)
      }
    }
  })

  it.each([
    // Closed forms: 1 − e^−1; 1 − e^−2 (1 + 2 + 2 + 4/3 + 2/3).
    [1, 1, 1 - Math.exp(-1)],
    [5, 2, 1 - 7 * Math.exp(-2)],
  ])('of %d at mean %d', (count, mean, expected) => {
    expect(Math.exp(logPoissonTail(count, mean))).toBeCloseTo(expected, 12)
  })

  it('stays finite far out and is certain at zero', () => {
    expect(logPoissonTail(0, 3)).toBe(0)
    expect(logPoissonTail(3, 0)).toBe(-Infinity)
    // Leading term of the tail: count·ln(mean) − mean − ln(count!), ln 1000! = 5912.128178.
    expect(logPoissonTail(1000, 1)).toBeCloseTo(-1 - 5912.128178, 2)
  })
})

describe('over-dispersed tail', () => {
  it('is the geometric law when variance is mean plus mean squared', () => {
    // Size 1: P(X ≥ k) = (mean / (1 + mean))^k exactly.
    for (const mean of [0.5, 2, 7]) {
      for (const count of [1, 4, 25]) {
        expect(logOverdispersedTail(count, mean, 1 + mean)).toBeCloseTo(
          count * Math.log(mean / (1 + mean)),
          8,
        )
      }
    }
  })

  it('becomes the Poisson law without dispersion and is heavier with it', () => {
    expect(logOverdispersedTail(12, 3, 1)).toBe(logPoissonTail(12, 3))
    expect(logOverdispersedTail(12, 3, 1.002)).toBeCloseTo(logPoissonTail(12, 3), 1)
    expect(logOverdispersedTail(12, 3, 4)).toBeGreaterThan(logPoissonTail(12, 3))
  })
})
