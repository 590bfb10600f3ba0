import { hasText, viewOf } from './bytes.ts'

/** The STREAMINFO block of a FLAC file (RFC 9639). */
export type FlacStreamInfo = {
  readonly sampleRateHz: number
  readonly channels: number
  /** 0 when the encoder did not know. */
  readonly totalSamples: number
}

/** Reads STREAMINFO from the bytes that begin with `fLaC`, or null. */
export function parseFlacStreamInfo(bytes: Uint8Array): FlacStreamInfo | null {
  if (!hasText(bytes, 0, 'fLaC') || bytes.length < 26) return null
  const view = viewOf(bytes)
  if ((view.getUint8(4) & 0x7f) !== 0) return null
  const packed = view.getBigUint64(18)
  return {
    sampleRateHz: Number(packed >> 44n),
    channels: Number((packed >> 41n) & 7n) + 1,
    totalSamples: Number(packed & 0xf_ffff_ffffn),
  }
}
