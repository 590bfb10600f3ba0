import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { applyDeductions } from './apply-deductions.ts'
import { proRataByDays } from './pro-rata-by-days.ts'

describe('proRataByDays', () => {
  it.each([
    [100_000n, 30, 30, 100_000n],
    [100_000n, 0, 30, 0n],
    // 1,000.00 × 10 ÷ 31 = 322.5806…
    [100_000n, 10, 31, 32_258n],
    // 100.01 × 15 ÷ 30 = 50.005: the half goes to the even cent. 100.03 × 15 ÷ 30 = 50.015.
    [10_001n, 15, 30, 5000n],
    [10_003n, 15, 30, 5002n],
    [1n, 14, 28, 0n],
  ])('charges %s for %i of %i days as %s', (fee, covered, days, expected) => {
    expect(proRataByDays(fee, covered, days)).toBe(expected)
  })

  it.each([
    [31, 30],
    [-1, 30],
    [1.5, 30],
    [1, 32],
  ])('refuses %d of %d days', (covered, days) => {
    expect(() => proRataByDays(100n, covered, days)).toThrow(
      expect.objectContaining({ code: 'invalid-input' }),
    )
  })
})

describe('applyDeductions', () => {
  const administration = { code: 'administration', label: 'Administration', ratePpm: 125_000 }
  const social = { code: 'social', label: 'Social and cultural purposes', ratePpm: 20_000 }

  it('takes each rate of the gross amount and names it', () => {
    // 12.5 % of 1,234.56 = 154.3200; 2 % = 24.6912; 1,234.56 − 154.32 − 24.69 = 1,055.55.
    expect(applyDeductions(123_456n, [social, administration])).toEqual({
      grossMinor: 123_456n,
      deductions: [
        { ...administration, amountMinor: 15_432n },
        { ...social, amountMinor: 2469n },
      ],
      netMinor: 105_555n,
    })
  })

  it('never takes more than there is when halves round up', () => {
    const halves = ['a', 'b'].map((code) => ({ code, label: code, ratePpm: 500_000 }))
    // 3 × 50 % = 1.5 rounds to 2 twice; the second takes the 1 that is left.
    const { deductions, netMinor } = applyDeductions(3n, halves)
    expect(deductions.map(({ amountMinor }) => amountMinor)).toEqual([2n, 1n])
    expect(netMinor).toBe(0n)
  })

  it('refuses rates over 100 % together, negative rates and a name used twice', () => {
    for (const rules of [
      [{ ...social, ratePpm: 1_000_001 }],
      [{ ...social, ratePpm: -1 }],
      [{ ...social, ratePpm: 0.5 }],
      [social, social],
    ]) {
      expect(() => applyDeductions(100n, rules)).toThrow(expect.objectContaining({ code: 'invalid-input' }))
    }
  })

  it('closes and stays within half a unit of each rate below 100 %', () => {
    fc.assert(
      fc.property(fc.bigInt(0n, 10n ** 15n), fc.nat(400_000), fc.nat(400_000), (gross, first, second) => {
        const { deductions, netMinor } = applyDeductions(gross, [
          { code: 'a', label: 'a', ratePpm: first },
          { code: 'b', label: 'b', ratePpm: second },
        ])
        const taken = deductions.reduce((sum, { amountMinor }) => sum + amountMinor, 0n)
        expect(taken + netMinor).toBe(gross)
        expect(netMinor >= 0n).toBe(true)
        for (const { amountMinor, ratePpm } of deductions) {
          const distance = 2n * (amountMinor * 1_000_000n - gross * BigInt(ratePpm))
          expect(distance <= 1_000_000n && distance >= -1_000_000n).toBe(true)
        }
      }),
    )
  })
})
