import { describe, expect, it } from 'vitest'
import { detectionDetail } from '../../testing/airtime-fixtures.ts'
import { describeAlignment, explainConfidence, explainSpeed } from './detection-words.ts'
import { ticksWithin } from './plot-scale.ts'

describe('explainConfidence', () => {
  it.each([
    [0.4, /every few hours/],
    [1.9, /in ten hours/],
    [6, /in a million hours/],
    [14.2, /in 10 to the 14 hours/],
    [99, /As good as certain/],
  ])('puts %d into words', (confidence, words) => {
    expect(explainConfidence(confidence)).toMatch(words)
  })
})

describe('explainSpeed', () => {
  it('names the difference only where there is one', () => {
    expect(explainSpeed(1.0001)).toBe('The speed of the reference')
    expect(explainSpeed(1.02)).toBe('2.0 % faster than the reference')
    expect(explainSpeed(0.985)).toBe('1.5 % slower than the reference')
  })
})

describe('describeAlignment', () => {
  it('measures the moment that lies furthest beside the line', () => {
    const detection = detectionDetail({
      logStartSeconds: 100,
      referenceStartSeconds: 10,
      speedRatio: 1,
      evidence: [
        { logSeconds: 101, referenceSeconds: 11 },
        { logSeconds: 105, referenceSeconds: 15.25 },
      ],
    })
    expect(describeAlignment(detection)).toContain('none further than 0.25\u00a0s')
  })
})

describe('ticksWithin', () => {
  it('chooses round moments, no more than asked for', () => {
    expect(ticksWithin({ from: 752, to: 951 }, 4)).toEqual([780, 840, 900])
    expect(ticksWithin({ from: 0, to: 7 }, 8)).toEqual([0, 1, 2, 3, 4, 5, 6, 7])
  })
})
