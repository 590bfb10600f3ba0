import { describe, expect, it } from 'vitest'
import { parseRange } from './file-answer.ts'

describe('parseRange', () => {
  it.each([
    ['bytes=0-9', { first: 0, last: 9 }],
    ['bytes=90-', { first: 90, last: 99 }],
    ['bytes=90-500', { first: 90, last: 99 }],
    ['bytes=-10', { first: 90, last: 99 }],
    ['bytes=-500', { first: 0, last: 99 }],
    ['bytes=100-', 'outside'],
    ['bytes=-0', 'outside'],
    ['bytes=9-3', null],
    ['bytes=0-1,5-6', null],
    ['bytes=-', null],
    ['lines=1-2', null],
    [undefined, null],
  ] as const)('reads %s of 100 bytes as RFC 9110 section 14.1.2 says', (header, range) => {
    expect(parseRange(header, 100)).toEqual(range)
  })
})
