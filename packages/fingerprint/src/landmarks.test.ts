import { describe, expect, it } from 'vitest'
import { packHash, pairPeaks, type PairingOptions } from './landmarks.ts'
import { engineParameters, HASH_BITS } from './parameters.ts'
import { createPeakStore } from './peak-store.ts'
import { cut, fingerprintOf, placed, tune } from './testing/tunes.ts'

const plain: PairingOptions = {
  maximumRank: 0,
  fanOut: 4,
  speedRatio: 1,
  pitchFollowsSpeed: false,
  boundaryMargin: 0,
}

function landmarksOf(
  peaks: readonly [number, number, number][],
  options: Partial<PairingOptions> = {},
): string[] {
  const store = createPeakStore()
  for (const peak of peaks) store.add(...peak)
  const found: string[] = []
  pairPeaks(store, 0, 1000, { ...plain, ...options }, (hash, frame) => void found.push(`${hash}@${frame}`))
  return found
}

describe('landmark hashes', () => {
  it('give each pair of peaks its own number of 22 bits', () => {
    const seen = new Set<number>()
    let count = 0
    for (let bin = 0; bin < 512; bin += 7) {
      for (let binDistance = -63; binDistance <= 63; binDistance += 3) {
        for (let frameDistance = 1; frameDistance <= 63; frameDistance += 2) {
          seen.add(packHash(bin, binDistance, frameDistance))
          count++
        }
      }
    }
    expect(seen.size).toBe(count)
    expect(Math.max(...[...seen].slice(0, 50_000))).toBeLessThan(2 ** HASH_BITS)
  })

  it('join a peak to the nearest later peaks within reach, no more than asked for', () => {
    const peaks: [number, number, number][] = [
      [0, 100, 0],
      [5, 110, 0],
      [6, 300, 0],
      [9, 120, 0],
      [200, 100, 0],
    ]
    expect(landmarksOf(peaks)).toEqual([
      `${packHash(100, 10, 5)}@0`,
      `${packHash(100, 20, 9)}@0`,
      `${packHash(110, 10, 4)}@5`,
    ])
    expect(landmarksOf(peaks, { fanOut: 1 })).toEqual([
      `${packHash(100, 10, 5)}@0`,
      `${packHash(110, 10, 4)}@5`,
    ])
  })

  it('leave out peaks of a higher rank than asked for', () => {
    expect(
      landmarksOf([
        [0, 100, 0],
        [5, 110, 2],
      ]),
    ).toEqual([])
  })

  it('bring a faster log back to the reference', () => {
    const slow: [number, number, number][] = [
      [100, 200, 0],
      [140, 220, 0],
    ]
    const fast = slow.map(([frame, bin, rank]): [number, number, number] => [frame / 1.04, bin * 1.04, rank])
    const back = landmarksOf(fast, { speedRatio: 1.04, pitchFollowsSpeed: true })
    expect(back.map((text) => text.split('@')[0])).toEqual([String(packHash(200, 20, 40))])
  })

  it('give both hashes when a distance lies at a rounding boundary', () => {
    const found = landmarksOf(
      [
        [0, 100, 0],
        [5.45, 110, 0],
      ],
      { boundaryMargin: 0.1 },
    )
    expect(found).toEqual([`${packHash(100, 10, 5)}@0`, `${packHash(100, 10, 6)}@0`])
  })

  it('are the same when the same sound comes a whole number of hops later', () => {
    const sound = tune(5, 8)
    const hops = 50
    const seconds = (hops * engineParameters.hopSamples) / engineParameters.sampleRateHz
    const early = fingerprintOf(placed(12, [[0, sound]]))
    const late = fingerprintOf(placed(12, [[seconds, sound]]))
    const early2 = Array.from(early.hashes, (hash, i) => `${hash}@${early.frames[i] + hops}`)
    const late2 = new Set(Array.from(late.hashes, (hash, i) => `${hash}@${late.frames[i]}`))
    const middle = early2.filter((_, i) => early.frames[i] > 20 && early.frames[i] < 200)
    expect(middle.length).toBeGreaterThan(100)
    expect(middle.filter((landmark) => late2.has(landmark)).length / middle.length).toBeGreaterThan(0.99)
  })

  it('number fewer than 110 a second, so that a minute of reference stays below 30 kB', () => {
    const seconds = 30
    expect(fingerprintOf(cut(tune(6, seconds), 0, seconds)).hashes.length / seconds).toBeLessThan(110)
  })
})
