import { describe, expect, it } from 'vitest'
import { neighbourOf } from './use-ribbon-keys.ts'
import { gapsOf, pixelSpans, ribbonSpans, spanAt, type RibbonSpan } from './ribbon-spans.ts'
import {
  NARROWEST_VIEW_MS,
  panView,
  revealSpan,
  tickStepMs,
  tickTimes,
  timeToX,
  viewSpanMs,
  xToTime,
  zoomView,
} from './ribbon-view.ts'

const HOUR = 3_600_000
const day = { fromMs: 0, toMs: 24 * HOUR }

function spanOf(kind: RibbonSpan['kind'], fromMs: number, toMs: number): RibbonSpan {
  const nothing = { label: null, logId: null, detectionId: null, playId: null }
  return { key: `${kind}-${fromMs}`, kind, fromMs, toMs, ...nothing }
}

describe('the view of a ribbon', () => {
  it('keeps the moment under the pointer in place while zooming', () => {
    const anchor = 6 * HOUR
    const view = zoomView(day, 0.25, anchor, day)

    expect(viewSpanMs(view)).toBe(6 * HOUR)
    expect(timeToX(anchor, view, 800)).toBeCloseTo(timeToX(anchor, day, 800), 6)
  })

  it('never looks closer than ten seconds nor wider than its bounds', () => {
    expect(viewSpanMs(zoomView(day, 1e-9, HOUR, day))).toBe(NARROWEST_VIEW_MS)
    expect(zoomView({ fromMs: HOUR, toMs: 2 * HOUR }, 1000, HOUR, day)).toEqual(day)
  })

  it('stops at the ends of the day when moved', () => {
    const view = { fromMs: 20 * HOUR, toMs: 22 * HOUR }

    expect(panView(view, 5, day)).toEqual({ fromMs: 22 * HOUR, toMs: 24 * HOUR })
    expect(panView(view, -50, day)).toEqual({ fromMs: 0, toMs: 2 * HOUR })
  })

  it('brings a stretch into sight at the same zoom, and stays where it is if it was in sight', () => {
    const view = { fromMs: 0, toMs: 2 * HOUR }
    const late = { fromMs: 10 * HOUR, toMs: 10 * HOUR + 60_000 }
    const revealed = revealSpan(view, late, day)

    expect(viewSpanMs(revealed)).toBe(2 * HOUR)
    expect(revealed.fromMs).toBeLessThan(late.fromMs)
    expect(revealed.toMs).toBeGreaterThan(late.toMs)
    expect(revealSpan(view, { fromMs: HOUR, toMs: HOUR + 1 }, day)).toBe(view)
  })

  it('turns pixels into times and back', () => {
    const view = { fromMs: 5 * HOUR, toMs: 7 * HOUR }

    expect(timeToX(xToTime(123.5, view, 640), view, 640)).toBeCloseTo(123.5, 9)
  })

  it('labels a day by hours and ten seconds by seconds', () => {
    expect(tickStepMs(day, 960)).toBe(2 * HOUR)
    expect(tickStepMs({ fromMs: 0, toMs: NARROWEST_VIEW_MS }, 960)).toBe(1_000)
  })

  it('counts ticks from midnight of the station, wherever the view begins', () => {
    const midnight = 30 * 60_000
    const bounds = { fromMs: midnight, toMs: midnight + 24 * HOUR }
    const ticks = tickTimes({ fromMs: midnight + 1, toMs: midnight + 6 * HOUR }, 400, bounds)

    expect(ticks.every((tick) => (tick - midnight) % HOUR === 0)).toBe(true)
    expect(ticks.length).toBeGreaterThan(2)
  })
})

describe('gapsOf', () => {
  it('finds what no log covers, with overlapping logs counted once', () => {
    const held = [
      { fromMs: 10 * HOUR, toMs: 24 * HOUR },
      { fromMs: HOUR, toMs: 5 * HOUR },
      { fromMs: 4 * HOUR, toMs: 6 * HOUR },
    ]

    expect(gapsOf(held, day)).toEqual([
      { fromMs: 0, toMs: HOUR },
      { fromMs: 6 * HOUR, toMs: 10 * HOUR },
    ])
  })

  it('is the whole day when nothing is held, and nothing when all is', () => {
    expect(gapsOf([], day)).toEqual([day])
    expect(gapsOf([{ fromMs: -HOUR, toMs: 25 * HOUR }], day)).toEqual([])
  })
})

describe('ribbonSpans', () => {
  it('adds the gaps to what the server sent, in order of time', () => {
    const spans = ribbonSpans(
      [
        { kind: 'play', from: '1970-01-01T02:00:00Z', to: '1970-01-01T02:03:00Z' },
        { kind: 'held', from: '1970-01-01T01:00:00Z', to: '1970-01-02T00:00:00Z' },
      ],
      day,
    )

    expect(spans.map((span) => span.kind)).toEqual(['gap', 'held', 'play'])
  })
})

describe('pixelSpans', () => {
  it('keeps a play of ten seconds visible on a whole day', () => {
    const [only] = pixelSpans([spanOf('play', HOUR, HOUR + 10_000)], 'play', day, 800)

    expect(only).toBeDefined()
    expect((only?.right ?? 0) - (only?.left ?? 0)).toBeGreaterThanOrEqual(1)
  })

  it('never draws more rectangles than there are pixels', () => {
    const many = Array.from({ length: 20_000 }, (_, index) =>
      spanOf('play', index * 4_000, index * 4_000 + 3_000),
    )

    expect(pixelSpans(many, 'play', day, 400).length).toBeLessThanOrEqual(400)
  })

  it('keeps two plays apart that are a second apart on screen', () => {
    const plays = [spanOf('play', 0, 4_000), spanOf('play', 5_000, 9_000)]

    expect(pixelSpans(plays, 'play', { fromMs: 0, toMs: 10_000 }, 800)).toHaveLength(2)
  })

  it('leaves out other kinds and what is out of sight', () => {
    const spans = [spanOf('speech', 0, HOUR), spanOf('play', 5 * HOUR, 6 * HOUR)]

    expect(pixelSpans(spans, 'play', { fromMs: 0, toMs: HOUR }, 800)).toEqual([])
  })
})

describe('finding stretches', () => {
  const events = [
    spanOf('play', 0, 200_000),
    spanOf('review', 190_000, 210_000),
    spanOf('play', 400_000, 500_000),
  ]

  it('takes the shorter of two that overlap', () => {
    expect(spanAt(events, 195_000, 0)?.kind).toBe('review')
  })

  it('takes one just beside the pointer, and none far from it', () => {
    expect(spanAt(events, 395_000, 6_000)?.fromMs).toBe(400_000)
    expect(spanAt(events, 300_000, 6_000)).toBeNull()
  })

  it('steps to the neighbour of the focus, or in from the edge of the screen', () => {
    expect(neighbourOf(events, 'review-190000', 1, 0)?.fromMs).toBe(400_000)
    expect(neighbourOf(events, null, 1, 300_000)?.fromMs).toBe(400_000)
    expect(neighbourOf(events, null, -1, 300_000)?.kind).toBe('review')
    expect(neighbourOf(events, 'play-400000', 1, 0)).toBeUndefined()
  })
})
