import { describe, expect, it } from 'vitest'
import { createIndex, type CatalogueIndex } from './catalogue-index.ts'
import type { Detection } from './detection.ts'
import { buildIndexSegment } from './index-segment.ts'
import { createLogAnalyser } from './log-analyser.ts'
import { cut, fingerprintOf, placed, tune, voice } from './testing/tunes.ts'

const REFERENCES = [1, 2, 3, 4, 5, 6].map((seed) => tune(seed, 45))
const ENTRIES = REFERENCES.map((samples, recordingNumber) => ({
  recordingNumber,
  fingerprint: fingerprintOf(samples),
}))

function indexOf(...groups: (typeof ENTRIES)[]): CatalogueIndex {
  const index = createIndex()
  for (const group of groups) index.addSegment(buildIndexSegment(group))
  return index
}

const INDEX = indexOf(ENTRIES)

function detect(log: Float32Array, index = INDEX, blockSamples = 16_000): Detection[] {
  const analyser = createLogAnalyser({ index })
  const detections: Detection[] = []
  for (let at = 0; at < log.length; at += blockSamples) {
    detections.push(...analyser.push(log.subarray(at, at + blockSamples)))
  }
  return [...detections, ...analyser.finish()]
}

function expectPlay(
  found: Detection | undefined,
  recordingNumber: number,
  startSeconds: number,
  endSeconds: number,
  referenceStartSeconds: number,
): void {
  expect(found).toMatchObject({ recordingNumber, decision: 'accept' })
  expect(Math.abs((found?.startSeconds ?? 0) - startSeconds)).toBeLessThan(1)
  expect(Math.abs((found?.endSeconds ?? 0) - endSeconds)).toBeLessThan(1)
  const offset = (found?.referenceStartSeconds ?? 0) - (found?.startSeconds ?? 0)
  expect(Math.abs(offset - (referenceStartSeconds - startSeconds))).toBeLessThan(0.3)
}

describe('log analyser', { timeout: 20_000 }, () => {
  it('finds plays within a second at both ends, one detection each', () => {
    const log = placed(130, [
      [5, REFERENCES[2]],
      [60, cut(REFERENCES[4], 10, 35)],
      [95, tune(99, 30)],
    ])
    const found = detect(log)
    expect(found).toHaveLength(2)
    expectPlay(found[0], 2, 5, 50, 0)
    expectPlay(found[1], 4, 60, 85, 10)
    expect(found[0].speedRatio).toBeCloseTo(1, 3)
    expect(found[0].evidence.length).toBeGreaterThan(50)
    expect(found[0].evidence.length).toBeLessThanOrEqual(200)
    for (const { logSeconds, referenceSeconds } of found[0].evidence) {
      expect(Math.abs(logSeconds - 5 - referenceSeconds)).toBeLessThan(0.2)
    }
  })

  it('states the confidence as the power of ten of the expected false alarms', () => {
    const [found] = detect(placed(20, [[3, cut(REFERENCES[0], 0, 5)]]))
    expect(found.expectedFalseAlarms).toBeGreaterThan(0)
    expect(found.confidence).toBeCloseTo(Math.min(99, -Math.log10(found.expectedFalseAlarms)), 9)
  })

  it('finds ten seconds of music with a voice over it', () => {
    const music = cut(REFERENCES[3], 20, 30)
    const found = detect(
      placed(40, [
        [15, music],
        [0, voice(1, 40)],
      ]),
    )
    expect(found).toHaveLength(1)
    expectPlay(found[0], 3, 15, 25, 20)
  })

  it.each([
    ['music the catalogue does not hold', tune(50, 40)],
    ['speech', voice(2, 30)],
    ['silence', new Float32Array(8000 * 30)],
    ['a log without samples', new Float32Array(0)],
  ])('finds nothing in %s', (_name, log) => {
    expect(detect(log)).toEqual([])
  })

  it('gives two detections for a recording played twice', () => {
    const found = detect(
      placed(100, [
        [2, REFERENCES[1]],
        [50, REFERENCES[1]],
      ]),
    )
    expect(found).toHaveLength(2)
    expectPlay(found[0], 1, 2, 47, 0)
    expectPlay(found[1], 1, 50, 95, 0)
  })

  it('finds both of two recordings that fade into each other', () => {
    const found = detect(
      placed(100, [
        [0, REFERENCES[0]],
        [42, REFERENCES[5]],
      ]),
    )
    expect(found).toHaveLength(2)
    expectPlay(found[0], 0, 0, 45, 0)
    expectPlay(found[1], 5, 42, 87, 0)
  })

  it('gives the whole span to the recording that explains it when another shares a passage', () => {
    const borrowed = placed(45, [[0, tune(77, 45)]])
    borrowed.set(cut(REFERENCES[2], 10, 22), 8000 * 20)
    const index = indexOf([...ENTRIES, { recordingNumber: 6, fingerprint: fingerprintOf(borrowed) }])
    const found = detect(placed(60, [[5, REFERENCES[2]]]), index)
    expect(found).toHaveLength(1)
    expectPlay(found[0], 2, 5, 50, 0)
  })

  it.each([1.04, 0.96, 1.015])('finds a recording played at %d times its speed and says so', (speed) => {
    const reference = REFERENCES[4]
    const played = Float32Array.from({ length: Math.floor(reference.length / speed) - 1 }, (_, n) => {
      const at = n * speed
      const whole = Math.floor(at)
      return reference[whole] + (at - whole) * (reference[whole + 1] - reference[whole])
    })
    const found = detect(placed(60, [[5, played]]))
    expect(found).toHaveLength(1)
    expect(found[0].recordingNumber).toBe(4)
    expect(Math.abs(found[0].speedRatio / speed - 1)).toBeLessThan(0.002)
    expect(Math.abs(found[0].startSeconds - 5)).toBeLessThan(1)
    expect(Math.abs(found[0].endSeconds - 5 - 45 / speed)).toBeLessThan(1)
  })

  it('gives the same detections however the log is cut into blocks', () => {
    const log = placed(70, [
      [3, REFERENCES[0]],
      [50, cut(REFERENCES[3], 5, 20)],
    ])
    const whole = detect(log, INDEX, log.length)
    const pieces = detect(log, INDEX, 777)
    const withoutLength = (found: Detection[]): string => JSON.stringify(found)
    expect(withoutLength(pieces)).toBe(withoutLength(whole))
    expect(whole).toHaveLength(2)
  })

  it('gives the same detections from many segments as from one', () => {
    const log = placed(70, [
      [3, REFERENCES[0]],
      [50, cut(REFERENCES[3], 5, 20)],
    ])
    const many = indexOf(...ENTRIES.map((entry) => [entry]))
    const times = (found: Detection[]) =>
      found.map(({ recordingNumber, startSeconds, endSeconds, agreeingHashes, decision }) => ({
        recordingNumber,
        startSeconds,
        endSeconds,
        agreeingHashes,
        decision,
      }))
    expect(times(detect(log, many))).toEqual(times(detect(log)))
  })

  it('does not report a recording that was removed', () => {
    const index = indexOf(ENTRIES)
    index.removeRecording(2)
    expect(detect(placed(60, [[5, REFERENCES[2]]]), index)).toEqual([])
  })
})
