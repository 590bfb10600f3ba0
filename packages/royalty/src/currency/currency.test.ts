import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatAmount, formatMoney, formatPlainAmount, parseAmount } from './amount-text.ts'
import { minorUnits } from './minor-units.ts'

describe('minorUnits', () => {
  it.each([
    // ISO 4217 list one, published 2024-06-25.
    ['EUR', 2],
    ['JPY', 0],
    ['KRW', 0],
    ['XOF', 0],
    ['KWD', 3],
    ['TND', 3],
    ['CLF', 4],
    // Currencies for which customary cash digits are fewer than the standard's.
    ['HUF', 2],
    ['IDR', 2],
    ['IQD', 3],
  ])('knows that %s has %i decimals', (currency, digits) => {
    expect(minorUnits(currency)).toBe(digits)
  })

  it.each(['XXX', 'XTS', 'XAU', 'XDR', 'eur', 'EURO', '', 'QQQ'])('refuses %s', (currency) => {
    expect(() => minorUnits(currency)).toThrow(expect.objectContaining({ code: 'unknown-currency' }))
  })
})

describe('amounts as text', () => {
  it.each([
    [1_234_567n, 'EUR', '12,345.67'],
    [1_234_567n, 'JPY', '1,234,567'],
    [1_234_567n, 'KWD', '1,234.567'],
    [1_234_567n, 'HUF', '12,345.67'],
    [5n, 'EUR', '0.05'],
    [0n, 'KWD', '0.000'],
    [0n, 'JPY', '0'],
    [-123_456n, 'EUR', '\u22121,234.56'],
    [100_000_000_000_000_000_001n, 'EUR', '1,000,000,000,000,000,000.01'],
  ])('writes %s of %s as %s', (amount, currency, text) => {
    expect(formatAmount(amount, currency)).toBe(text)
  })

  it('writes plain figures for programs and the code for people', () => {
    expect(formatPlainAmount(-123_456_789n, 'EUR')).toBe('-1234567.89')
    expect(formatMoney(123_456n, 'EUR')).toBe('EUR\u00a01,234.56')
  })

  it.each([
    ['12,345.67', 'EUR', 1_234_567n],
    ['12345.6', 'EUR', 1_234_560n],
    [' 12 ', 'EUR', 1200n],
    ['-0.05', 'EUR', -5n],
    ['\u22121,234', 'JPY', -1234n],
    ['1.005', 'KWD', 1005n],
  ])('reads %s of %s', (text, currency, amount) => {
    expect(parseAmount(text, currency)).toBe(amount)
  })

  it.each([
    ['12,34.56', 'EUR'],
    ['1.234', 'EUR'],
    ['1.0', 'JPY'],
    ['1e3', 'EUR'],
    ['', 'EUR'],
    ['--1', 'EUR'],
    ['1.234,56', 'EUR'],
    ['.5', 'EUR'],
  ])('refuses %s of %s', (text, currency) => {
    expect(() => parseAmount(text, currency)).toThrow(expect.objectContaining({ code: 'unreadable-amount' }))
  })

  it('reads back what it writes', () => {
    fc.assert(
      fc.property(fc.bigInt(), fc.constantFrom('JPY', 'EUR', 'KWD'), (amount, currency) => {
        expect(parseAmount(formatAmount(amount, currency), currency)).toBe(amount)
        expect(parseAmount(formatPlainAmount(amount, currency), currency)).toBe(amount)
      }),
    )
  })
})
