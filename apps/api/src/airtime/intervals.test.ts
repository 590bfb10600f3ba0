import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { clip, coveredSeconds, subtract, unionOf, type Interval } from './intervals.ts'

const span = (fromMs: number, toMs: number): Interval => ({ fromMs, toMs })

const anySpans = fc.array(
  fc
    .tuple(fc.integer({ min: 0, max: 60 }), fc.integer({ min: 0, max: 20 }))
    .map(([from, length]) => span(from, from + length)),
  { maxLength: 12 },
)

/** The slow, obvious answer: each millisecond on its own. */
function millisecondsOf(spans: readonly Interval[]): Set<number> {
  const held = new Set<number>()
  for (const { fromMs, toMs } of spans) for (let at = fromMs; at < toMs; at += 1) held.add(at)
  return held
}

describe('unionOf', () => {
  it('joins what overlaps or touches and keeps gaps', () => {
    expect(unionOf([span(10, 20), span(0, 5), span(15, 30), span(30, 31)])).toEqual([
      span(0, 5),
      span(10, 31),
    ])
  })

  it('joins neighbours that are no further apart than asked', () => {
    expect(unionOf([span(0, 5), span(8, 10), span(14, 15)], 3)).toEqual([span(0, 10), span(14, 15)])
  })

  it('covers the same time as its parts, whatever they are', () => {
    fc.assert(
      fc.property(anySpans, (spans) => {
        const joined = unionOf(spans)
        expect(millisecondsOf(joined)).toEqual(millisecondsOf(spans))
        expect(coveredSeconds(spans)).toBe(millisecondsOf(spans).size / 1000)
      }),
    )
  })
})

describe('subtract', () => {
  it('cuts holes, and keeps both ends', () => {
    expect(subtract([span(0, 100)], [span(20, 30), span(25, 40), span(90, 120)])).toEqual([
      span(0, 20),
      span(40, 90),
    ])
  })

  it('leaves nothing where all is covered', () => {
    expect(subtract([span(5, 10), span(12, 15)], [span(0, 20)])).toEqual([])
  })

  it('leaves exactly the milliseconds that are in the first and not in the second, whatever they are', () => {
    fc.assert(
      fc.property(anySpans, anySpans, (minuend, subtrahend) => {
        const removed = millisecondsOf(subtrahend)
        const expected = [...millisecondsOf(minuend)].filter((at) => !removed.has(at)).sort((a, b) => a - b)
        const remaining = subtract(minuend, subtrahend)
        expect([...millisecondsOf(remaining)].sort((a, b) => a - b)).toEqual(expected)
        expect(unionOf(remaining)).toEqual(remaining)
      }),
    )
  })
})

describe('clip', () => {
  it('keeps the part within the bounds and what else the span carries', () => {
    expect(clip({ ...span(0, 50), label: 'kept' }, span(10, 20))).toEqual({ ...span(10, 20), label: 'kept' })
  })

  it('gives nothing for a span that only touches the bounds', () => {
    expect(clip(span(0, 10), span(10, 20))).toBeNull()
  })
})
