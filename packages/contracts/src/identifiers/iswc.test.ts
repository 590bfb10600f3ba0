import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { formatIswc, iswcCheckDigit, readIswc } from './iswc.ts'

/** Vectors: the example of ISO 15707, the first ISWC issued, public identifier test files. */
describe('readIswc', () => {
  it.each([
    ['T-034.524.680-1', 'T0345246801'],
    ['T-000.000.001-0', 'T0000000010'],
    ['T-101.914.232-4', 'T1019142324'],
    ['T-000000001.0', 'T0000000010'],
    ['t0000000010', 'T0000000010'],
    ['T- 101.914.232-4', 'T1019142324'],
    ['ISWC T-034.524.680-1', 'T0345246801'],
  ])('reads %s as %s', (input, expected) => {
    expect(readIswc(input)).toEqual({ ok: true, iswc: expected })
  })

  it.each(['T-911.471.758-8', 'T-034.524.608-1', 'T-304.524.680-1', 'T-000.000.001-9'])(
    'refuses the check digit of %s and names the right one',
    (input) => {
      const reading = readIswc(input)
      expect(reading.ok ? '' : reading.message).toMatch(/check digit .* expected \d/)
    },
  )

  it('refuses ten figures alone, which could be another number', () => {
    expect(readIswc('0345246801')).toMatchObject({ ok: false })
  })

  it('passes a change the check cannot see: a valid digit proves nothing', () => {
    expect(readIswc('T-034.544.680-1').ok).toBe(true)
  })

  it('round-trips every number through the printed form', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 999_999_999 }), (number) => {
        const digits = String(number).padStart(9, '0')
        const iswc = `T${digits}${iswcCheckDigit(digits)}`
        expect(readIswc(formatIswc(iswc))).toEqual({ ok: true, iswc })
      }),
    )
  })
})
