import { describe, expect, it, vi } from 'vitest'
import { applyFieldErrors } from './form-problems.ts'

function formWith(values: { name: string; shares: { percent: string }[] }) {
  return { getValues: vi.fn(() => values), setError: vi.fn() }
}

describe('applyFieldErrors', () => {
  it('puts each complaint at its field, nested ones too, and focuses the first', () => {
    const form = formWith({ name: '', shares: [{ percent: '50' }, { percent: '60' }] })

    const placed = applyFieldErrors(form, [
      { path: 'shares.1.percent', message: 'The shares make more than 100 %.' },
      { path: 'body.name', message: 'Name is needed.' },
    ])

    expect(placed).toBe(2)
    expect(form.setError.mock.calls).toEqual([
      [
        'shares.1.percent',
        { type: 'server', message: 'The shares make more than 100 %.' },
        { shouldFocus: true },
      ],
      ['name', { type: 'server', message: 'Name is needed.' }, { shouldFocus: false }],
    ])
  })

  it('leaves complaints about fields the form does not have to the caller', () => {
    const form = formWith({ name: '', shares: [] })

    expect(applyFieldErrors(form, [{ path: 'shares.0.percent', message: 'Too much.' }])).toBe(0)
    expect(form.setError).not.toHaveBeenCalled()
  })
})
