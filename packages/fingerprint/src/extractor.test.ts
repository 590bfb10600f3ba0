import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { createLandmarkExtractor, type Landmarks } from './extractor.ts'
import { tune } from './testing/tunes.ts'

const SOUND = tune(3, 6)

function extract(sizes: readonly number[], isDrainedEachTime: boolean): Landmarks {
  const extractor = createLandmarkExtractor()
  const parts: Landmarks[] = []
  let at = 0
  for (let n = 0; at < SOUND.length; n++) {
    const size = sizes[n % sizes.length]
    extractor.push(SOUND.subarray(at, at + size))
    at += size
    if (isDrainedEachTime) parts.push(extractor.drain())
  }
  extractor.finish()
  parts.push(extractor.drain())
  return {
    hashes: Uint32Array.from(parts.flatMap(({ hashes }) => [...hashes])),
    frames: Uint32Array.from(parts.flatMap(({ frames }) => [...frames])),
  }
}

describe('landmark extractor', () => {
  it('gives the same landmarks however the samples are cut into blocks', () => {
    const whole = extract([SOUND.length], false)
    expect(whole.hashes.length).toBeGreaterThan(100)
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 1, max: 9000 }), { minLength: 1, maxLength: 6 }),
        fc.boolean(),
        (sizes, isDrainedEachTime) => {
          expect(extract(sizes, isDrainedEachTime)).toEqual(whole)
        },
      ),
      { numRuns: 10 },
    )
  })

  it('gives landmarks in order of time', () => {
    const { frames } = extract([4096], false)
    expect([...frames]).toEqual([...frames].sort((a, b) => a - b))
  })

  it('counts its samples and forgets what was drained', () => {
    const extractor = createLandmarkExtractor()
    extractor.push(SOUND)
    extractor.finish()
    expect(extractor.sampleCount()).toBe(SOUND.length)
    expect(extractor.drain().hashes.length).toBeGreaterThan(0)
    expect(extractor.drain().hashes).toHaveLength(0)
  })
})
