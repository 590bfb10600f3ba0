import { describe, expect, it } from 'vitest'
import { formatIsrc, readIsrc } from './isrc.ts'

/** Vectors: isrc.ifpi.org (AA6Q7…), ISRC Agency Bulletin 2015/01, DDEX illustrations, public identifier test files. */
describe('readIsrc', () => {
  it.each([
    ['AA6Q72000047', 'AA6Q72000047'],
    ['GB-EMI-03-00013', 'GBEMI0300013'],
    ['usl4q0702458', 'USL4Q0702458'],
    ['ISRC GB-AJY-12-34567', 'GBAJY1234567'],
    ['US-SKG-19-12345', 'USSKG1912345'],
    ['QMDA71418090', 'QMDA71418090'],
    ['USS1Z1412345', 'USS1Z1412345'],
    ['GB‐EMI–03—00013', 'GBEMI0300013'],
  ])('reads %s as %s', (input, expected) => {
    expect(readIsrc(input)).toMatchObject({ ok: true, isrc: expected })
  })

  it.each(['XX-SKG-19-12345', 'ZYXWV1234567'])('warns of the prefix of %s without refusing it', (input) => {
    const reading = readIsrc(input)
    expect(reading.ok && reading.warning).toContain('not one known to be allotted')
  })

  it.each(['GBAJY1234567', 'USRMS8371421', 'QMDA71418090'])(
    'has no complaint about the prefix of %s',
    (input) => {
      expect(readIsrc(input)).toMatchObject({ ok: true, warning: null })
    },
  )

  it.each([
    ['US-S1Z-99-0000', 'this has 11'],
    ['USS1Z14123456', 'this has 13'],
    ['USS1Z14I2345', 'Did you mean USS1Z1412345'],
    ['', 'this has 0'],
    ['12S1Z1412345', 'two letters'],
  ])('refuses %s and says why', (input, words) => {
    const reading = readIsrc(input)
    expect(reading.ok ? '' : reading.message).toContain(words)
  })

  it('never cuts a labelled code to twelve characters, the trap the bulletin names', () => {
    expect(readIsrc('ISRC GBAJY12').ok).toBe(false)
  })

  it('shows the grouped form', () => {
    expect(formatIsrc('AA6Q72000047')).toBe('AA-6Q7-20-00047')
  })
})
