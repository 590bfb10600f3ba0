import { hasText, viewOf, type ByteSource } from './bytes.ts'

type OggCodec = 'ogg-vorbis' | 'ogg-opus' | 'ogg-flac'

/** One logical stream inside an Ogg file (RFC 3533), described by its first page. */
export type OggStream = {
  readonly codec: OggCodec
  readonly serial: number
  readonly channels: number
  /** Rate in which positions are counted: always 48,000 for Opus (RFC 7845). */
  readonly sampleRateHz: number
  /** Samples to drop at the start (Opus); 0 elsewhere. */
  readonly preSkip: number
}

type OggPage = {
  readonly isFirst: boolean
  readonly isLast: boolean
  /** Samples up to the end of this page; negative when no packet ends in it. */
  readonly granule: number
  readonly serial: number
  readonly bodyOffset: number
  readonly endOffset: number
}

const PAGE_HEADER_BYTES = 27
const MAXIMUM_PAGE_BYTES = PAGE_HEADER_BYTES + 255 + 255 * 255

function parsePage(bytes: Uint8Array, offset: number): OggPage | null {
  if (!hasText(bytes, offset, 'OggS') || offset + PAGE_HEADER_BYTES > bytes.length) return null
  const view = viewOf(bytes)
  const flags = view.getUint8(offset + 5)
  const segments = view.getUint8(offset + 26)
  const bodyOffset = offset + PAGE_HEADER_BYTES + segments
  if (bodyOffset > bytes.length) return null
  const bodyBytes = bytes
    .subarray(offset + PAGE_HEADER_BYTES, bodyOffset)
    .reduce((sum, length) => sum + length, 0)
  return {
    isFirst: (flags & 2) !== 0,
    isLast: (flags & 4) !== 0,
    granule: Number(view.getBigInt64(offset + 6, true)),
    serial: view.getUint32(offset + 14, true),
    bodyOffset,
    endOffset: bodyOffset + bodyBytes,
  }
}

function parseStream(bytes: Uint8Array, page: OggPage): OggStream | null {
  const at = page.bodyOffset
  const { serial } = page
  const view = viewOf(bytes)
  if (at + 32 > bytes.length && at + 19 > bytes.length) return null
  if (hasText(bytes, at, '\x01vorbis')) {
    const channels = view.getUint8(at + 11)
    return { codec: 'ogg-vorbis', serial, channels, sampleRateHz: view.getUint32(at + 12, true), preSkip: 0 }
  }
  if (hasText(bytes, at, 'OpusHead')) {
    const preSkip = view.getUint16(at + 10, true)
    return { codec: 'ogg-opus', serial, channels: view.getUint8(at + 9), sampleRateHz: 48_000, preSkip }
  }
  if (hasText(bytes, at, '\x7fFLAC') && at + 31 <= bytes.length) {
    const packed = view.getUint32(at + 27)
    const channels = ((packed >> 9) & 7) + 1
    return { codec: 'ogg-flac', serial, channels, sampleRateHz: packed >>> 12, preSkip: 0 }
  }
  return null
}

/** The audio codec of an Ogg file, from its first pages, or null. */
export function oggCodecOf(head: Uint8Array): OggCodec | null {
  return firstStream(head)?.codec ?? null
}

function firstStream(head: Uint8Array): OggStream | null {
  let page = parsePage(head, 0)
  while (page?.isFirst) {
    const stream = parseStream(head, page)
    if (stream) return stream
    page = parsePage(head, page.endOffset)
  }
  return null
}

/** What the pages of an Ogg file say about its length. */
export type OggSummary = {
  readonly stream: OggStream
  readonly durationSeconds: number
  /** False when the last page does not close the stream: the file was cut off. */
  readonly isComplete: boolean
  /** More than one stream, one after the other. */
  readonly isChained: boolean
}

function lastPageOf(tail: Uint8Array): OggPage | null {
  for (let offset = tail.length - PAGE_HEADER_BYTES; offset >= 0; offset--) {
    const page = parsePage(tail, offset)
    if (page && page.endOffset <= tail.length && page.granule >= 0) return page
  }
  return null
}

/** Walks every page header; needed for chained files, where only the sum of all links is the duration. */
async function sumOfLinks(source: ByteSource, start: number): Promise<number> {
  let seconds = 0
  let current: OggStream | null = null
  let granule = 0
  const closeLink = () => {
    if (current) seconds += Math.max(0, granule - current.preSkip) / current.sampleRateHz
    granule = 0
  }
  for (let position = start; position < source.sizeBytes;) {
    const block = await source.readAt(position, 16 * MAXIMUM_PAGE_BYTES)
    let offset = 0
    while (offset < block.length) {
      const page = parsePage(block, offset)
      if (!page) break
      if (page.isFirst) {
        closeLink()
        current = parseStream(block, page) ?? current
      }
      if (page.granule > 0) granule = page.granule
      offset = page.endOffset
    }
    // Nothing parsed at all: damaged here, so look for the next page one byte on.
    position += offset > 0 ? offset : Math.max(1, block.subarray(1).indexOf(0x4f) + 1)
  }
  closeLink()
  return seconds
}

/** Reads an Ogg file's length from its pages, or null when its first page is not audio we know. */
export async function summariseOgg(source: ByteSource, start: number): Promise<OggSummary | null> {
  const head = await source.readAt(start, 2 * MAXIMUM_PAGE_BYTES)
  const stream = firstStream(head)
  if (!stream || stream.sampleRateHz === 0) return null
  const tailBytes = Math.min(source.sizeBytes - start, 2 * MAXIMUM_PAGE_BYTES)
  const last = lastPageOf(await source.readAt(source.sizeBytes - tailBytes, tailBytes))
  if (!last) return { stream, durationSeconds: 0, isComplete: false, isChained: false }
  const isChained = last.serial !== stream.serial
  const durationSeconds = isChained
    ? await sumOfLinks(source, start)
    : Math.max(0, last.granule - stream.preSkip) / stream.sampleRateHz
  return { stream, durationSeconds, isComplete: last.isLast, isChained }
}
