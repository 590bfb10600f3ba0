import { hasText, viewOf } from './bytes.ts'

/** One MPEG audio or ADTS frame header: enough to walk from frame to frame. */
export type FrameHeader = {
  readonly codec: 'mp3' | 'mp2' | 'aac'
  readonly sampleRateHz: number
  readonly channels: number
  readonly frameBytes: number
  readonly samplesPerFrame: number
  /** Bytes between the header and the place of a Xing tag; 0 where there is none. */
  readonly sideInformationBytes: number
}

type ParseFrame = (bytes: Uint8Array, offset: number) => FrameHeader | null

// ISO/IEC 11172-3 and 13818-3 header tables (from memory; checked by the tests against files written by ffmpeg).
const KBPS_V1_LAYER3 = [0, 32, 40, 48, 56, 64, 80, 96, 112, 128, 160, 192, 224, 256, 320]
const KBPS_V1_LAYER2 = [0, 32, 48, 56, 64, 80, 96, 112, 128, 160, 192, 224, 256, 320, 384]
const KBPS_V2 = [0, 8, 16, 24, 32, 40, 48, 56, 64, 80, 96, 112, 128, 144, 160]
const RATES_V1_HZ = [44_100, 48_000, 32_000]
const ADTS_RATES_HZ = [
  96_000, 88_200, 64_000, 48_000, 44_100, 32_000, 24_000, 22_050, 16_000, 12_000, 11_025, 8000, 7350,
]

/** Reads an MPEG-1/2/2.5 layer II or III frame header. Free-format frames are not accepted. */
export function parseMpegFrame(bytes: Uint8Array, offset: number): FrameHeader | null {
  const [b0, b1, b2, b3] = bytes.subarray(offset, offset + 4)
  if (b0 !== 0xff || b1 === undefined || b2 === undefined || b3 === undefined || (b1 & 0xe0) !== 0xe0)
    return null
  const versionBits = (b1 >> 3) & 3
  const layerBits = (b1 >> 1) & 3
  const isLayer3 = layerBits === 1
  if (versionBits === 1 || (!isLayer3 && layerBits !== 2)) return null
  const isVersion1 = versionBits === 3
  const table = isVersion1 ? (isLayer3 ? KBPS_V1_LAYER3 : KBPS_V1_LAYER2) : KBPS_V2
  const kbps = table[b2 >> 4]
  const rateV1Hz = RATES_V1_HZ[(b2 >> 2) & 3]
  if (!kbps || !rateV1Hz) return null
  const sampleRateHz = rateV1Hz / (isVersion1 ? 1 : versionBits === 2 ? 2 : 4)
  const samplesPerFrame = isLayer3 && !isVersion1 ? 576 : 1152
  const channels = b3 >> 6 === 3 ? 1 : 2
  return {
    codec: isLayer3 ? 'mp3' : 'mp2',
    sampleRateHz,
    channels,
    samplesPerFrame,
    frameBytes: Math.floor((samplesPerFrame * kbps * 125) / sampleRateHz) + ((b2 >> 1) & 1),
    sideInformationBytes: isVersion1 ? (channels === 1 ? 17 : 32) : channels === 1 ? 9 : 17,
  }
}

/** Reads an ADTS header (ISO/IEC 14496-3). */
export function parseAdtsFrame(bytes: Uint8Array, offset: number): FrameHeader | null {
  const [b0, b1, b2, b3, b4, b5] = bytes.subarray(offset, offset + 6)
  if (b0 !== 0xff || b1 === undefined || (b1 & 0xf6) !== 0xf0) return null
  if (b2 === undefined || b3 === undefined || b4 === undefined || b5 === undefined) return null
  const sampleRateHz = ADTS_RATES_HZ[(b2 >> 2) & 15]
  const frameBytes = ((b3 & 3) << 11) | (b4 << 3) | (b5 >> 5)
  if (!sampleRateHz || frameBytes < 9) return null
  const channels = ((b2 & 1) << 2) | (b3 >> 6)
  return {
    codec: 'aac',
    sampleRateHz,
    channels: channels || 2,
    frameBytes,
    samplesPerFrame: 1024,
    sideInformationBytes: 0,
  }
}

/** Length of an ID3v2 tag at this offset, its footer included; 0 when there is none. */
export function id3v2Bytes(bytes: Uint8Array, offset: number): number {
  if (!hasText(bytes, offset, 'ID3')) return 0
  const [version, , flags, s0, s1, s2, s3] = bytes.subarray(offset + 3, offset + 10)
  if (version === undefined || version < 2 || version > 4 || flags === undefined) return 0
  if (s0 === undefined || s1 === undefined || s2 === undefined || s3 === undefined) return 0
  if ((s0 | s1 | s2 | s3) & 0x80) return 0
  return 10 + ((s0 << 21) | (s1 << 14) | (s2 << 7) | s3) + (flags & 0x10 ? 10 : 0)
}

function sameStream(a: FrameHeader, b: FrameHeader): boolean {
  return a.codec === b.codec && a.sampleRateHz === b.sampleRateHz
}

/** How many frames follow each other without a break from `offset`, up to `limit`. */
export function countChainedFrames(bytes: Uint8Array, offset: number, parse: ParseFrame, limit: number) {
  const first = parse(bytes, offset)
  let frames = 0
  let position = offset
  for (let frame = first; first && frame && sameStream(first, frame) && frames < limit; frames++) {
    position += frame.frameBytes
    frame = parse(bytes, position)
  }
  return { first, frames, endOffset: position }
}

const CHAIN_FRAMES = 4

/**
 * The first offset from which frames really follow each other, so that garbage that merely looks like a sync word is
 * passed over. A lone frame counts only where it is the very first thing and fills the rest of the bytes.
 */
export function findFirstFrame(
  bytes: Uint8Array,
  from: number,
): { offset: number; frame: FrameHeader } | null {
  for (let offset = bytes.indexOf(0xff, from); offset >= 0; offset = bytes.indexOf(0xff, offset + 1)) {
    for (const parse of [parseMpegFrame, parseAdtsFrame]) {
      const { first, frames, endOffset } = countChainedFrames(bytes, offset, parse, CHAIN_FRAMES)
      const reachesEnd = endOffset >= bytes.length - 4
      const isEnough = frames >= CHAIN_FRAMES || (reachesEnd && (frames >= 2 || offset === from))
      if (first && isEnough) return { offset, frame: first }
    }
  }
  return null
}

/** Samples promised by a Xing/Info or VBRI tag in the first frame, encoder delay and padding taken off, or null. */
export function taggedSampleCount(bytes: Uint8Array, offset: number, frame: FrameHeader): number | null {
  const tag = offset + 4 + frame.sideInformationBytes
  const view = viewOf(bytes)
  if (hasText(bytes, tag, 'Xing') || hasText(bytes, tag, 'Info')) {
    if (tag + 16 > bytes.length) return null
    const flags = view.getUint32(tag + 4)
    if (!(flags & 1)) return null
    const samples = view.getUint32(tag + 8) * frame.samplesPerFrame
    // The encoder's extension follows the optional fields: frame count, byte count, seek table, quality.
    const extension = tag + 8 + 4 + (flags & 2 ? 4 : 0) + (flags & 4 ? 100 : 0) + (flags & 8 ? 4 : 0)
    if (extension + 24 > bytes.length || bytes[extension] === 0) return samples
    const trim = (view.getUint8(extension + 21) << 16) | view.getUint16(extension + 22)
    return Math.max(0, samples - (trim >> 12) - (trim & 0xfff))
  }
  const vbri = offset + 36
  if (hasText(bytes, vbri, 'VBRI') && vbri + 18 <= bytes.length) {
    return view.getUint32(vbri + 14) * frame.samplesPerFrame
  }
  return null
}
