import { instantSchema } from '@fieldfare/contracts'
import { describe, expect, it } from 'vitest'
import { decideAirtime } from './airtime.ts'

const at = (time: string) => new Date(`2026-10-05T${time}Z`)
const held = (from: string, to: string) => ({
  fileName: 'held.mp3',
  from: instantSchema.parse(at(from).toISOString()),
  to: instantSchema.parse(at(to).toISOString()),
})
const stretch = { from: at('10:00:00'), to: at('11:00:00') }

describe('decideAirtime', () => {
  it('leaves a log alone that touches its neighbours', () => {
    const neighbours = [held('09:00:00', '10:00:00'), held('11:00:00', '12:00:00')]
    expect(decideAirtime(stretch, neighbours)).toEqual({ kind: 'free', ...stretch })
  })

  it('gives an overlap of two seconds at either end to the log that is held', () => {
    const neighbours = [held('09:00:00', '10:00:02'), held('10:59:58', '12:00:00')]
    expect(decideAirtime(stretch, neighbours)).toEqual({
      kind: 'free',
      from: at('10:00:02'),
      to: at('10:59:58'),
    })
  })

  it('refuses an overlap longer than that, and says how long', () => {
    const other = held('09:00:00', '10:00:03')
    expect(decideAirtime(stretch, [other])).toEqual({ kind: 'overlap', held: other, overlapMs: 3000 })
  })

  it.each([
    ['the same hour', held('10:00:00', '11:00:00')],
    ['a log within it, however short', held('10:30:00', '10:30:01')],
    ['a log around it', held('09:00:00', '12:00:00')],
  ])('refuses %s', (_name, other) => {
    expect(decideAirtime(stretch, [other]).kind).toBe('overlap')
  })
})
