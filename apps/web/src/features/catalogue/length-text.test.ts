import { describe, expect, it } from 'vitest'
import { lengthToSeconds, secondsToLength } from './length-text.ts'

describe('lengthToSeconds', () => {
  it.each([
    ['3:45', 225],
    ['225.5', 225.5],
    ['1:02:03', 3723],
    ['62:05', 3725],
  ])('reads %s', (text, seconds) => {
    expect(lengthToSeconds(text)).toBe(seconds)
  })

  it.each(['', '3:60', '1:75:00', 'three', '-3'])('refuses %s', (text) => {
    expect(lengthToSeconds(text)).toBeNull()
  })

  it('keeps milliseconds on the way back', () => {
    expect(lengthToSeconds(secondsToLength(187.257))).toBe(187.257)
    expect(secondsToLength(225)).toBe('3:45')
  })
})
