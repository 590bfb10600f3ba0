import { describe, expect, it } from 'vitest'
import { localTimeInFileName } from './time-in-file-name.ts'

describe('localTimeInFileName', () => {
  it.each([
    ['2026-11-03_06-00.wav', '2026-11-03T06:00:00'],
    ['KITE 20261103T060000.mp3', '2026-11-03T06:00:00'],
    ['20261103-060130_air.flac', '2026-11-03T06:01:30'],
    ['air_2026.11.03 23h59.ogg', '2026-11-03T23:59:00'],
  ])('reads %s', (name, expected) => {
    expect(localTimeInFileName(name)).toBe(expected)
  })

  it.each([
    ['morning.wav'],
    ['20261103.wav'],
    ['20261303T060000.wav'],
    ['20261103T250000.wav'],
    ['20261103T060000Z.wav'],
    ['2026-11-03_06-00 to 2026-11-03_09-00.wav'],
    ['920261103T0600001.wav'],
  ])('does not guess from %s', (name) => {
    expect(localTimeInFileName(name)).toBeNull()
  })
})
