import { describe, expect, it } from 'vitest'
import { isrcInFileName } from './isrc-in-file-name.ts'

// AA6Q72000047 is the made-up example of isrc.ifpi.org, "never to be used".
describe('isrcInFileName', () => {
  it.each([
    'AA6Q72000047.wav',
    'aa6q72000047.mp3',
    'AA-6Q7-20-00047 Title.flac',
    '03_AA_6Q7_20_00047_master.wav',
    'Title (AA-6Q7-2000047).ogg',
    'A long name – ISRC AA–6Q7–20–00047.m4a',
  ])('finds the code in %s', (name) => {
    expect(isrcInFileName(name)).toBe('AA6Q72000047')
  })

  it.each([
    'Title.wav',
    'AA6Q7200004.wav',
    'XAA6Q72000047.wav',
    'AA6Q720000471.wav',
    'track 01 2026-10-25.wav',
  ])('finds none in %s', (name) => {
    expect(isrcInFileName(name)).toBeNull()
  })
})
