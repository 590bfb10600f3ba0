import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  decodeFingerprint,
  encodeFingerprint,
  FingerprintFormatError,
  isCurrentFingerprint,
  type Fingerprint,
} from './fingerprint-codec.ts'
import { fingerprintOf, tune } from './testing/tunes.ts'

const fingerprints = fc
  .record({
    engineVersion: fc.string({ maxLength: 40 }),
    durationSeconds: fc.double({ min: 0, max: 1e6, noNaN: true }),
    landmarks: fc.array(fc.tuple(fc.nat({ max: 2 ** 22 - 1 }), fc.nat({ max: 2 ** 31 })), { maxLength: 60 }),
  })
  .map(({ engineVersion, durationSeconds, landmarks }): Fingerprint => {
    const sorted = [...landmarks].sort((a, b) => a[1] - b[1])
    return {
      engineVersion,
      durationSeconds,
      hashes: Uint32Array.from(sorted, ([hash]) => hash),
      frames: Uint32Array.from(sorted, ([, frame]) => frame),
    }
  })

describe('fingerprint codec', () => {
  it('gives back what was encoded', () => {
    fc.assert(
      fc.property(fingerprints, (fingerprint) => {
        expect(decodeFingerprint(encodeFingerprint(fingerprint))).toEqual(fingerprint)
      }),
    )
  })

  it('takes less than 30 kB a minute of music', () => {
    const fingerprint = fingerprintOf(tune(1, 30))
    expect(encodeFingerprint(fingerprint).length * 2).toBeLessThan(30_000)
    expect(isCurrentFingerprint(fingerprint)).toBe(true)
    expect(isCurrentFingerprint({ ...fingerprint, engineVersion: 'older' })).toBe(false)
  })

  it('refuses bytes that are cut off, prolonged or something else', () => {
    const bytes = encodeFingerprint(fingerprintOf(tune(1, 3)))
    const prolonged = new Uint8Array(bytes.length + 1)
    prolonged.set(bytes)
    const later = bytes.slice()
    later[4] = 9
    const samples = [bytes.slice(0, 10), bytes.slice(0, -1), prolonged, later, new Uint8Array(64)]
    for (const sample of samples) expect(() => decodeFingerprint(sample)).toThrow(FingerprintFormatError)
  })

  it('refuses to encode frames out of order', () => {
    const broken = {
      ...fingerprintOf(tune(1, 3)),
      hashes: Uint32Array.of(1, 2),
      frames: Uint32Array.of(5, 4),
    }
    expect(() => encodeFingerprint(broken)).toThrow(RangeError)
  })
})
