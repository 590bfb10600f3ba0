import { describe, expect, it } from 'vitest'
import { formatIpi, readIpi } from './ipi.ts'

/** Vectors: numbers used in public CWR examples; sums worked by hand from the CISAC rule. */
describe('readIpi', () => {
  it.each([
    ['00014107338', true],
    ['00014107339', false],
    ['00026239279', false],
    ['00026955529', false],
    ['00199701514', false],
    ['00000589900', true],
    ['00000499900', true],
  ])('reads %s, check fits: %s', (input, checkOk) => {
    expect(readIpi(input)).toEqual({ ok: true, ipi: input, checkOk })
  })

  it('pads an old number with zeros', () => {
    expect(readIpi('14107338')).toEqual({ ok: true, ipi: '00014107338', checkOk: true })
  })

  it.each(['00000000000', '123', '123456789012', 'I-000000229-7', ''])('refuses %s', (input) => {
    expect(readIpi(input).ok).toBe(false)
  })

  it('groups for reading', () => {
    expect(formatIpi('00014107338')).toBe('000 141 073 38')
  })
})
