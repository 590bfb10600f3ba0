import { describe, expect, it } from 'vitest'
import { bestSpan } from './span.ts'

/** Hits at an even rate between two frames. */
function evenly(from: number, to: number, count: number): number[] {
  return Array.from({ length: count }, (_, n) => from + ((to - from) * n) / count)
}

const background = { backgroundPerFrame: 0.005, dispersionPerFrame: 0 }

describe('best span', () => {
  it('is nothing without hits', () => {
    expect(bestSpan(new Float64Array(0), background)).toBeNull()
  })

  it('leaves out stray hits far from the play', () => {
    const frames = Float64Array.from([5, 300, ...evenly(1000, 2000, 300), 2600, 3100])
    expect(bestSpan(frames, background)).toEqual({ first: 2, last: 301 })
  })

  it('bridges a stretch covered by speech', () => {
    const frames = Float64Array.from([...evenly(0, 1000, 300), ...evenly(1400, 2400, 300)])
    expect(bestSpan(frames, background)).toEqual({ first: 0, last: 599 })
  })

  it('takes in a faint opening whose hits come faster than by chance, and stops before it', () => {
    const frames = Float64Array.from([100, ...evenly(1000, 1400, 12), ...evenly(1400, 3000, 800)])
    expect(bestSpan(frames, background)?.first).toBe(1)
  })

  it('leaves the same opening out when chance alone would bring it', () => {
    const frames = Float64Array.from([...evenly(1000, 1400, 12), ...evenly(1400, 3000, 800)])
    expect(bestSpan(frames, { backgroundPerFrame: 0.03, dispersionPerFrame: 0 })?.first).toBeGreaterThan(6)
  })
})
