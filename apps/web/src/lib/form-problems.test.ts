import { describe, expect, it, vi } from 'vitest'
import { placeFieldErrors } from './form-problems.ts'

describe('placeFieldErrors', () => {
  it('hands each complaint to its field, nested ones too, and focuses the first', () => {
    const place = vi.fn()
    const values = { name: '', shares: [{ percent: '50' }, { percent: '60' }] }

    const placed = placeFieldErrors(
      values,
      [
        { path: 'shares.1.percent', message: 'The shares make more than 100 %.' },
        { path: 'body.name', message: 'Name is needed.' },
      ],
      place,
    )

    expect(placed).toBe(2)
    expect(place.mock.calls).toEqual([
      ['shares.1.percent', 'The shares make more than 100 %.', true],
      ['name', 'Name is needed.', false],
    ])
  })

  it('leaves complaints about fields the form does not have to the caller', () => {
    const place = vi.fn()
    const errors = [{ path: 'shares.0.percent', message: 'Too much.' }]

    expect(placeFieldErrors({ name: '', shares: [] }, errors, place)).toBe(0)
    expect(place).not.toHaveBeenCalled()
  })
})
