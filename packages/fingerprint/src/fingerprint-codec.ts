import { ENGINE_VERSION } from './parameters.ts'

/** What is stored of a reference recording. Landmarks are in order of time. */
export type Fingerprint = {
  readonly engineVersion: string
  readonly durationSeconds: number
  readonly hashes: Uint32Array
  readonly frames: Uint32Array
}

/** Bytes that are no fingerprint, or one of a later format. */
export class FingerprintFormatError extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'FingerprintFormatError'
  }
}

const MAGIC = 0x46465031
const FORMAT = 1
const HEADER_BYTES = 4 + 1 + 1 + 8 + 4

/**
 * Bytes of a fingerprint: magic, format, engine version, duration, count, then per landmark the frame difference as
 * a variable-length number and the hash in three bytes. About 3.3 bytes per landmark.
 */
export function encodeFingerprint(fingerprint: Fingerprint): Uint8Array {
  const { hashes, frames, durationSeconds } = fingerprint
  const version = new TextEncoder().encode(fingerprint.engineVersion)
  if (hashes.length !== frames.length) throw new RangeError('hashes and frames differ in length')
  if (version.length > 255) throw new RangeError('engineVersion is too long')
  const bytes = new Uint8Array(HEADER_BYTES + version.length + hashes.length * 8)
  const view = new DataView(bytes.buffer)
  view.setUint32(0, MAGIC)
  bytes[4] = FORMAT
  bytes[5] = version.length
  view.setFloat64(6, durationSeconds)
  view.setUint32(14, hashes.length)
  bytes.set(version, HEADER_BYTES)
  let at = HEADER_BYTES + version.length
  let previous = 0
  for (let n = 0; n < hashes.length; n++) {
    if (frames[n] < previous) throw new RangeError('frames are not in order')
    let difference = frames[n] - previous
    previous = frames[n]
    while (difference >= 128) {
      bytes[at++] = (difference % 128) | 128
      difference = Math.floor(difference / 128)
    }
    bytes[at++] = difference
    bytes[at++] = hashes[n] & 255
    bytes[at++] = (hashes[n] >>> 8) & 255
    bytes[at++] = (hashes[n] >>> 16) & 255
  }
  return bytes.slice(0, at)
}

/** Reads what {@link encodeFingerprint} wrote. @throws FingerprintFormatError when the bytes are anything else. */
export function decodeFingerprint(bytes: Uint8Array): Fingerprint {
  if (bytes.length < HEADER_BYTES) throw new FingerprintFormatError('too short for a fingerprint')
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  if (view.getUint32(0) !== MAGIC) throw new FingerprintFormatError('not a fingerprint')
  if (bytes[4] !== FORMAT) throw new FingerprintFormatError(`unknown fingerprint format ${bytes[4]}`)
  const count = view.getUint32(14)
  let at = HEADER_BYTES + bytes[5]
  if (bytes.length < at + count * 4) throw new FingerprintFormatError('fingerprint is cut off')
  const engineVersion = new TextDecoder().decode(bytes.subarray(HEADER_BYTES, at))
  const hashes = new Uint32Array(count)
  const frames = new Uint32Array(count)
  let frame = 0
  for (let n = 0; n < count; n++) {
    let scale = 1
    while (at < bytes.length && bytes[at] >= 128) {
      frame += (bytes[at++] - 128) * scale
      scale *= 128
    }
    if (at + 4 > bytes.length) throw new FingerprintFormatError('fingerprint is cut off')
    frame += bytes[at] * scale
    frames[n] = frame
    hashes[n] = bytes[at + 1] | (bytes[at + 2] << 8) | (bytes[at + 3] << 16)
    at += 4
  }
  if (at !== bytes.length) throw new FingerprintFormatError('fingerprint has bytes left over')
  return { engineVersion, durationSeconds: view.getFloat64(6), hashes, frames }
}

/** Whether a stored fingerprint can be matched by this engine; if not, the reference must be read again. */
export function isCurrentFingerprint(fingerprint: Fingerprint): boolean {
  return fingerprint.engineVersion === ENGINE_VERSION
}
