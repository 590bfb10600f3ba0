import type { Readable } from 'node:stream'

/** What is known of a stored object. */
export type StoredObject = { key: string; sizeBytes: number }

/** How much is kept in all. */
export type StorageUsage = { objects: number; bytes: number }

/** Bytes to store: a stream read once, or a file on this machine's disk (kept where it is). */
export type ObjectSource = { stream: Readable } | { filePath: string }

/** A stretch of bytes, both ends included, as in an HTTP Range header. */
export type ByteRange = { first: number; last: number }

/**
 * Files of the product: station logs, reference audio, clips, statements. Keys are made by us, of letters,
 * figures and `.` `_` `-` between slashes; a name that a person gave never becomes part of one.
 */
export type ObjectStorage = {
  readonly kind: 'disk' | 's3'
  /** Stores or replaces. A reader sees the old bytes or all of the new ones, never a part. */
  put: (key: string, source: ObjectSource) => Promise<StoredObject>
  /** @throws ObjectNotFound */
  read: (key: string) => Promise<Readable>
  /** @throws ObjectNotFound, RangeError when the range lies outside the object */
  readRange: (key: string, range: ByteRange) => Promise<Readable>
  /**
   * Gives `work` a path on this machine's disk, for tools that need one: the file itself on disk storage (so never
   * write to it), a copy that is removed afterwards on S3.
   *
   * @throws ObjectNotFound
   */
  withLocalFile: <Result>(key: string, work: (path: string) => Promise<Result>) => Promise<Result>
  /** Removing what is not there is no error. */
  remove: (key: string) => Promise<void>
  stat: (key: string) => Promise<StoredObject | null>
  /** Walks everything: for the system page, not for requests of every day. */
  usage: () => Promise<StorageUsage>
  close: () => void
}

/** The storage holds nothing under this key. */
export class ObjectNotFound extends Error {
  readonly key: string

  constructor(key: string, cause?: unknown) {
    super(`Nothing is stored under ${key}`, { cause })
    this.name = 'ObjectNotFound'
    this.key = key
  }
}

const KEY = /^[A-Za-z0-9_-][A-Za-z0-9._-]*(\/[A-Za-z0-9_-][A-Za-z0-9._-]*)*$/

/** @throws RangeError for a key that could leave its folder or mean two things in two stores. */
export function assertStorageKey(key: string): void {
  if (key.length > 300 || !KEY.test(key)) throw new RangeError(`Not a storage key: ${JSON.stringify(key)}`)
}

/** @throws RangeError unless the range lies within an object of this size. */
export function assertByteRange(range: ByteRange, sizeBytes: number): void {
  const isInside =
    Number.isInteger(range.first) &&
    Number.isInteger(range.last) &&
    range.first >= 0 &&
    range.first <= range.last &&
    range.last < sizeBytes
  if (!isInside)
    throw new RangeError(`Bytes ${range.first}-${range.last} lie outside an object of ${sizeBytes} bytes`)
}
