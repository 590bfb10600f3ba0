import { describe, expect, it } from 'vitest'
import { readReturnAddress, signInAddress } from './return-address.ts'

describe('the way back after sign-in', () => {
  it('leads to the page that was asked for, filters included', () => {
    const address = signInAddress({ pathname: '/logs', search: '?status=failed' })

    expect(readReturnAddress(new URL(address, 'http://page').searchParams)).toBe('/logs?status=failed')
  })

  it.each([
    'https://elsewhere.example/',
    '//elsewhere.example',
    '/\\elsewhere.example',
    'javascript:alert(1)',
    '',
  ])('never leads to %s', (wanted) => {
    expect(readReturnAddress(new URLSearchParams({ return: wanted }))).toBe('/')
  })
})
