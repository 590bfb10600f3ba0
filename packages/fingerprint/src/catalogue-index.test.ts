import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { createIndex, type CatalogueIndex } from './catalogue-index.ts'
import {
  buildIndexSegment,
  endOfHash,
  segmentFromBuffers,
  segmentToBuffers,
  startOfHash,
  type IndexEntry,
} from './index-segment.ts'
import { ENGINE_VERSION } from './parameters.ts'

/** Few different hashes, so that buckets hold several. */
const HASHES = [0, 1, 2, 63, 64, 65, 4096, 70_000, 70_001, 2 ** 22 - 1]

const catalogues = fc
  .array(fc.array(fc.tuple(fc.constantFrom(...HASHES), fc.nat({ max: 3000 })), { maxLength: 40 }), {
    minLength: 1,
    maxLength: 8,
  })
  .map((recordings) =>
    recordings.map((landmarks, n): IndexEntry => {
      const sorted = [...landmarks].sort((a, b) => a[1] - b[1])
      return {
        recordingNumber: 10 * n + 3,
        fingerprint: {
          engineVersion: ENGINE_VERSION,
          durationSeconds: 100,
          hashes: Uint32Array.from(sorted, ([hash]) => hash),
          frames: Uint32Array.from(sorted, ([, frame]) => frame),
        },
      }
    }),
  )

function lookUp(index: CatalogueIndex, hash: number): string[] {
  const found: string[] = []
  for (const { segment, base } of index.segments) {
    for (let slot = startOfHash(segment, hash); slot < endOfHash(segment, hash); slot++) {
      const position = base + segment.positions[slot]
      const recording = index.recordingAt(position)
      if (recording) found.push(`${recording.recordingNumber}@${position - recording.start}`)
    }
  }
  return found.sort()
}

/** The slow and obvious way. */
function lookUpSlowly(entries: readonly IndexEntry[], hash: number): string[] {
  return entries
    .flatMap(({ recordingNumber, fingerprint: { hashes, frames } }) =>
      [...hashes].flatMap((other, i) => (other === hash ? [`${recordingNumber}@${frames[i]}`] : [])),
    )
    .sort()
}

function indexOf(...groups: readonly (readonly IndexEntry[])[]): CatalogueIndex {
  const index = createIndex()
  for (const group of groups) index.addSegment(buildIndexSegment(group))
  return index
}

describe('index', () => {
  it('finds what a search through all landmarks finds, in one segment or many', () => {
    fc.assert(
      fc.property(catalogues, (entries) => {
        const one = indexOf(entries)
        const many = indexOf(...entries.map((entry) => [entry]))
        for (const hash of HASHES) {
          const expected = lookUpSlowly(entries, hash)
          expect(lookUp(one, hash)).toEqual(expected)
          expect(lookUp(many, hash)).toEqual(expected)
        }
      }),
    )
  })

  it('finds the same after its segment went through a shared buffer', () => {
    fc.assert(
      fc.property(catalogues, (entries) => {
        const { data } = segmentToBuffers(buildIndexSegment(entries))
        expect(data).toBeInstanceOf(SharedArrayBuffer)
        const index = createIndex()
        index.addSegment(segmentFromBuffers({ data }))
        for (const hash of HASHES) expect(lookUp(index, hash)).toEqual(lookUpSlowly(entries, hash))
      }),
      { numRuns: 20 },
    )
  })

  it('forgets a recording that was removed and takes it back in a later segment', () => {
    fc.assert(
      fc.property(catalogues, (entries) => {
        const index = indexOf(entries)
        const [removed, ...rest] = entries
        expect(index.removeRecording(removed.recordingNumber)).toBe(true)
        expect(index.removeRecording(removed.recordingNumber)).toBe(false)
        expect(index.recordingCount).toBe(rest.length)
        for (const hash of HASHES) expect(lookUp(index, hash)).toEqual(lookUpSlowly(rest, hash))
        index.addSegment(buildIndexSegment([removed]))
        for (const hash of HASHES) expect(lookUp(index, hash)).toEqual(lookUpSlowly(entries, hash))
      }),
    )
  })

  it('counts its landmarks and bytes', () => {
    const entries = fc.sample(catalogues, { numRuns: 1, seed: 4 })[0]
    const index = indexOf(entries)
    expect(index.hashCount).toBe(entries.reduce((sum, { fingerprint }) => sum + fingerprint.hashes.length, 0))
    expect(index.byteLength).toBeGreaterThan(index.hashCount * 4)
  })

  it('refuses a recording twice and bytes that are no segment', () => {
    const [entry] = fc.sample(catalogues, { numRuns: 1, seed: 1 })[0]
    expect(() => buildIndexSegment([entry, entry])).toThrow(RangeError)
    const index = indexOf([entry])
    expect(() => index.addSegment(buildIndexSegment([entry]))).toThrow(RangeError)
    expect(() => segmentFromBuffers({ data: new ArrayBuffer(100) })).toThrow(RangeError)
    expect(() => buildIndexSegment([{ ...entry, recordingNumber: -1 }])).toThrow(RangeError)
  })
})
