import type { LogSpan } from '@fieldfare/database'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { markIdentifiedAsMusic, totalMs } from './spans.ts'

const span = (kind: LogSpan['kind'], startMs: number, endMs: number): LogSpan => ({ kind, startMs, endMs })

describe('markIdentifiedAsMusic', () => {
  it('turns speech over a recognised tune into music', () => {
    const heard = [span('speech', 0, 10_000), span('music', 10_000, 20_000), span('speech', 20_000, 30_000)]
    expect(markIdentifiedAsMusic(heard, [{ startMs: 8000, endMs: 22_000 }], 30_000)).toEqual([
      span('speech', 0, 8000),
      span('music', 8000, 22_000),
      span('speech', 22_000, 30_000),
    ])
  })

  it('joins overlapping plays, as in a crossfade', () => {
    const plays = [
      { startMs: 0, endMs: 6000 },
      { startMs: 5000, endMs: 10_000 },
    ]
    expect(markIdentifiedAsMusic([span('speech', 0, 12_000)], plays, 12_000)).toEqual([
      span('music', 0, 10_000),
      span('speech', 10_000, 12_000),
    ])
  })

  it('cuts what reaches beyond the log', () => {
    expect(markIdentifiedAsMusic([span('silence', 0, 5000)], [{ startMs: 4000, endMs: 9000 }], 5000)).toEqual(
      [span('silence', 0, 4000), span('music', 4000, 5000)],
    )
  })

  it('covers the log exactly once whatever was heard and recognised', () => {
    const stretch = fc
      .tuple(fc.integer({ min: 0, max: 9999 }), fc.integer({ min: 1, max: 4000 }))
      .map(([startMs, length]) => ({ startMs, endMs: startMs + length }))
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 9999 }), fc.array(stretch, { maxLength: 6 }), (cut, plays) => {
        const spans = markIdentifiedAsMusic(
          [span('speech', 0, cut), span('silence', cut, 10_000)],
          plays,
          10_000,
        )
        const kinds = ['music', 'speech', 'silence'] as const
        expect(kinds.reduce((sum, kind) => sum + totalMs(spans, kind), 0)).toBe(10_000)
        for (const [index, next] of spans.slice(1).entries()) expect(next.startMs).toBe(spans[index]?.endMs)
      }),
    )
  })
})
