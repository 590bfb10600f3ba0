import { describe, expect, it } from 'vitest'
import { composeTune } from '../synthesis/compose-tune.ts'
import { renderSpeech } from '../synthesis/render-speech.ts'
import { renderTune } from '../synthesis/render-tune.ts'
import { createAirtimeClassifier, type AirtimeSpan } from './airtime-classifier.ts'

const RATE_HZ = 8000
const TEXT =
  'Good evening. The ferry to the islands leaves at a quarter past nine, and there are still a few seats. ' +
  'The harbour office asks drivers to come early, because the road along the quay is being mended. ' +
  'Tomorrow will be dry, with a cold wind from the north east, and some frost at night in the valleys.'

function classify(samples: Float32Array, blockSamples = 4000): AirtimeSpan[] {
  const classifier = createAirtimeClassifier({ sampleRateHz: RATE_HZ })
  for (let start = 0; start < samples.length; start += blockSamples) {
    classifier.push(samples.subarray(start, start + blockSamples))
  }
  return classifier.finish()
}

function join(...parts: Float32Array[]): Float32Array {
  const joined = new Float32Array(parts.reduce((total, part) => total + part.length, 0))
  let offset = 0
  for (const part of parts) {
    joined.set(part, offset)
    offset += part.length
  }
  return joined
}

function secondsOf(
  spans: readonly AirtimeSpan[],
  kind: AirtimeSpan['kind'],
  from = 0,
  to = Infinity,
): number {
  return spans
    .filter((span) => span.kind === kind)
    .reduce(
      (sum, span) => sum + Math.max(0, Math.min(to, span.endSeconds) - Math.max(from, span.startSeconds)),
      0,
    )
}

const tuneOf = (seed: number, seconds: number) =>
  renderTune(composeTune(seed), RATE_HZ).subarray(10 * RATE_HZ, (10 + seconds) * RATE_HZ)

describe('airtime classifier', () => {
  // Seeds that took no part in fitting the weights.
  it.each([101, 102, 103, 104, 105, 106])('calls generated tune %i music', (seed) => {
    const spans = classify(tuneOf(seed, 60))
    expect(secondsOf(spans, 'music')).toBeGreaterThan(54)
  })

  it('finds speech, music and silence where they are', async () => {
    const speech = await renderSpeech(TEXT, { name: 'en-gb+m4', sampleRateHz: RATE_HZ })
    if (speech === null) throw new Error('espeak-ng is needed for this test')
    const spoken = speech.length / RATE_HZ
    const log = join(tuneOf(110, 30), speech, new Float32Array(5 * RATE_HZ), tuneOf(111, 30))
    const spans = classify(log)
    expect(secondsOf(spans, 'music', 0, 30)).toBeGreaterThan(28)
    expect(secondsOf(spans, 'speech', 30, 30 + spoken)).toBeGreaterThan(spoken - 2.5)
    expect(secondsOf(spans, 'silence', 30 + spoken, 35 + spoken)).toBeGreaterThan(4.2)
    expect(secondsOf(spans, 'music', 35 + spoken)).toBeGreaterThan(28)
    expect(spans[0]?.startSeconds).toBe(0)
    expect(spans[spans.length - 1]?.endSeconds).toBeCloseTo(log.length / RATE_HZ, 9)
    spans.slice(1).forEach((span, i) => expect(span.startSeconds).toBe(spans[i]?.endSeconds))
    for (const span of spans) expect(span.endSeconds - span.startSeconds).toBeGreaterThanOrEqual(1)
    expect(classify(log, 777)).toEqual(spans)
    expect(classify(log, log.length)).toEqual(spans)
  })

  it('is not moved by the level of the recording', () => {
    const tune = tuneOf(101, 30)
    expect(classify(tune.map((value) => 0.1 * value))).toEqual(classify(tune))
  })

  it('calls silence silence, and gives nothing for nothing', () => {
    expect(classify(new Float32Array(10 * RATE_HZ))).toEqual([
      { kind: 'silence', startSeconds: 0, endSeconds: 10 },
    ])
    expect(classify(new Float32Array(0))).toEqual([])
  })

  it('refuses a rate it was not made for', () => {
    expect(() => createAirtimeClassifier({ sampleRateHz: 44_100 })).toThrow(RangeError)
  })
})
