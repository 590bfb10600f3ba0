import type { Fingerprint } from './fingerprint-codec.ts'
import { engineParameters, HASH_BITS, SECONDS_PER_FRAME } from './parameters.ts'

/** One recording of the catalogue and what it sounds like. */
export type IndexEntry = { readonly recordingNumber: number; readonly fingerprint: Fingerprint }

/**
 * An immutable part of the index. All its recordings lie one after another on one axis of frames, so that one number
 * (a position) names both a recording and a moment in it. Landmarks are grouped in buckets by the upper bits of their
 * hash and sorted by the remaining bits (the tag), then by position.
 */
export type IndexSegment = {
  readonly buffer: ArrayBufferLike
  readonly recordingNumbers: Uint32Array
  /** First position of each recording, ascending. */
  readonly recordingStarts: Uint32Array
  /** Length of each recording in frames. */
  readonly recordingFrames: Uint32Array
  readonly tagBits: number
  readonly bucketStarts: Uint32Array
  readonly tags: Uint8Array | Uint16Array
  readonly positions: Uint32Array
  /** Length of the axis. */
  readonly totalFrames: number
}

/** What travels between threads or lies in a cache file: one buffer, shared when it is a SharedArrayBuffer. */
export type SegmentBuffers = { readonly data: ArrayBufferLike }

/** Silence between recordings on the axis, longer than a landmark. */
const GAP_FRAMES = 2 * engineParameters.maximumFrameDistance
/** Aim: about this many landmarks a bucket, so that the table of buckets costs half a byte a landmark. */
const LANDMARKS_PER_BUCKET_BITS = 3
const MAGIC = 0x46495831
const HEADER_WORDS = 8

type Shape = {
  readonly recordings: number
  readonly landmarks: number
  readonly bucketBits: number
  readonly totalFrames: number
}

function tagBytesFor(tagBits: number): 0 | 1 | 2 {
  return tagBits === 0 ? 0 : tagBits <= 8 ? 1 : 2
}

function byteLengthOf({ recordings, landmarks, bucketBits }: Shape): number {
  const words = HEADER_WORDS + 3 * recordings + 2 ** bucketBits + 1 + landmarks
  return words * 4 + Math.ceil((landmarks * tagBytesFor(HASH_BITS - bucketBits)) / 4) * 4
}

function viewsOf(buffer: ArrayBufferLike, shape: Shape): IndexSegment {
  const { recordings, landmarks, bucketBits, totalFrames } = shape
  const tagBits = HASH_BITS - bucketBits
  let offset = HEADER_WORDS * 4
  const words = (length: number): Uint32Array => {
    const view = new Uint32Array(buffer, offset, length)
    offset += length * 4
    return view
  }
  return {
    buffer,
    recordingNumbers: words(recordings),
    recordingStarts: words(recordings),
    recordingFrames: words(recordings),
    bucketStarts: words(2 ** bucketBits + 1),
    positions: words(landmarks),
    tags:
      tagBytesFor(tagBits) === 2
        ? new Uint16Array(buffer, offset, landmarks)
        : new Uint8Array(buffer, offset, tagBits === 0 ? 0 : landmarks),
    tagBits,
    totalFrames,
  }
}

function shapeOf(entries: readonly IndexEntry[]): Shape {
  let landmarks = 0
  let totalFrames = 0
  for (const { fingerprint } of entries) {
    landmarks += fingerprint.hashes.length
    totalFrames += framesOf(fingerprint) + GAP_FRAMES
  }
  const bits = Math.floor(Math.log2(Math.max(1, landmarks))) - LANDMARKS_PER_BUCKET_BITS
  return {
    recordings: entries.length,
    landmarks,
    totalFrames,
    bucketBits: Math.max(6, Math.min(HASH_BITS, bits)),
  }
}

function framesOf(fingerprint: Fingerprint): number {
  const last = fingerprint.frames.at(-1) ?? 0
  return Math.max(1, Math.ceil(fingerprint.durationSeconds / SECONDS_PER_FRAME), last + 1)
}

/** Sorts one bucket by tag, keeping the order of positions among equal tags (insertion: buckets are short). */
function sortBucket(segment: IndexSegment, from: number, to: number): void {
  const { tags, positions } = segment
  for (let i = from + 1; i < to; i++) {
    const tag = tags[i]
    const position = positions[i]
    let slot = i
    while (slot > from && tags[slot - 1] > tag) {
      tags[slot] = tags[slot - 1]
      positions[slot] = positions[slot - 1]
      slot--
    }
    tags[slot] = tag
    positions[slot] = position
  }
}

function placeRecordings(segment: IndexSegment, entries: readonly IndexEntry[]): void {
  let start = 0
  entries.forEach(({ recordingNumber, fingerprint }, n) => {
    segment.recordingNumbers[n] = recordingNumber
    segment.recordingStarts[n] = start
    segment.recordingFrames[n] = framesOf(fingerprint)
    start += framesOf(fingerprint) + GAP_FRAMES
  })
}

function placeLandmarks(segment: IndexSegment, entries: readonly IndexEntry[]): void {
  const { bucketStarts, positions, tags, tagBits, recordingStarts } = segment
  for (const { fingerprint } of entries) {
    for (const hash of fingerprint.hashes) bucketStarts[(hash >>> tagBits) + 1]++
  }
  for (let bucket = 1; bucket < bucketStarts.length; bucket++)
    bucketStarts[bucket] += bucketStarts[bucket - 1]
  const next = bucketStarts.slice(0, -1)
  const tagMask = 2 ** tagBits - 1
  entries.forEach(({ fingerprint: { hashes, frames } }, n) => {
    for (let i = 0; i < hashes.length; i++) {
      const slot = next[hashes[i] >>> tagBits]++
      positions[slot] = recordingStarts[n] + frames[i]
      if (tagBits > 0) tags[slot] = hashes[i] & tagMask
    }
  })
  if (tagBits === 0) return
  for (let bucket = 0; bucket + 1 < bucketStarts.length; bucket++) {
    sortBucket(segment, bucketStarts[bucket], bucketStarts[bucket + 1])
  }
}

/**
 * Builds a segment in memory that threads can share. Cost: linear in the landmarks.
 * @throws RangeError when a recording number is not a 32-bit number or appears twice.
 */
export function buildIndexSegment(entries: readonly IndexEntry[]): IndexSegment {
  const numbers = new Set(entries.map(({ recordingNumber }) => recordingNumber))
  if (numbers.size !== entries.length) throw new RangeError('a recording number appears twice')
  for (const number of numbers) {
    if (!Number.isInteger(number) || number < 0 || number > 0xffffffff) {
      throw new RangeError(`recording number ${number} is not an unsigned 32-bit number`)
    }
  }
  const shape = shapeOf(entries)
  const buffer = new SharedArrayBuffer(byteLengthOf(shape))
  const { recordings, landmarks, bucketBits, totalFrames } = shape
  new Uint32Array(buffer, 0, HEADER_WORDS).set([MAGIC, 1, recordings, landmarks, bucketBits, totalFrames])
  const segment = viewsOf(buffer, shape)
  placeRecordings(segment, entries)
  placeLandmarks(segment, entries)
  return segment
}

/** The bytes of a segment; posting them to a thread shares them, nothing is copied. */
export function segmentToBuffers(segment: IndexSegment): SegmentBuffers {
  return { data: segment.buffer }
}

/** Lays a segment over the buffer of another thread or of a cache file. @throws RangeError for other bytes. */
export function segmentFromBuffers({ data }: SegmentBuffers): IndexSegment {
  if (data.byteLength < HEADER_WORDS * 4) throw new RangeError('not an index segment')
  const [magic, version, recordings, landmarks, bucketBits, totalFrames] = new Uint32Array(
    data,
    0,
    HEADER_WORDS,
  )
  const shape = { recordings, landmarks, bucketBits, totalFrames }
  if (magic !== MAGIC || version !== 1 || bucketBits > HASH_BITS || byteLengthOf(shape) !== data.byteLength) {
    throw new RangeError('not an index segment of this version')
  }
  return viewsOf(data, shape)
}

/** Slot of the first landmark with this hash; the slots end where {@link endOfHash} says. */
export function startOfHash(segment: IndexSegment, hash: number): number {
  return tagBound(segment, hash, 0)
}

/** Slot after the last landmark with this hash. */
export function endOfHash(segment: IndexSegment, hash: number): number {
  return tagBound(segment, hash, 1)
}

function tagBound(segment: IndexSegment, hash: number, beyond: 0 | 1): number {
  const { tagBits, bucketStarts, tags } = segment
  const bucket = hash >>> tagBits
  if (tagBits === 0) return bucketStarts[bucket + beyond]
  const sought = (hash & ((1 << tagBits) - 1)) + beyond
  let low = bucketStarts[bucket]
  let high = bucketStarts[bucket + 1]
  while (low < high) {
    const middle = (low + high) >>> 1
    if (tags[middle] < sought) low = middle + 1
    else high = middle
  }
  return low
}

/** First slot in [low, high) whose position is at least `position`. */
export function firstSlotAt(positions: Uint32Array, low: number, high: number, position: number): number {
  while (low < high) {
    const middle = (low + high) >>> 1
    if (positions[middle] < position) low = middle + 1
    else high = middle
  }
  return low
}
