import { absurdHeader, undecodable } from '../audio-error.ts'
import { hasText, viewOf, type ByteSource } from './bytes.ts'

/** The `fmt ` chunk of a WAV file, `WAVE_FORMAT_EXTENSIBLE` already resolved. */
export type WaveFormat = {
  /** 1 integer PCM, 3 float, 6 A-law, 7 µ-law, 0x50/0x55 MPEG audio, … */
  readonly formatTag: number
  readonly channels: number
  readonly sampleRateHz: number
  readonly bytesPerSecond: number
  /** Bytes of one sample of all channels. */
  readonly blockBytes: number
  readonly bitsPerSample: number
}

/** Where things are in a WAV, RF64 or BW64 file (EBU Tech 3285 and 3306). */
export type WaveLayout = {
  readonly format: WaveFormat
  readonly dataOffset: number
  /** Bytes of audio that are really in the file. */
  readonly dataBytes: number
  /** Bytes the header promises, or null when the recorder never filled it in. */
  readonly declaredDataBytes: number | null
  /** The Broadcast Wave extension chunk, when there is one. */
  readonly broadcastExtension: { readonly offset: number; readonly bytes: number } | null
}

const UNSET_SIZE = 0xffff_ffff
const MAXIMUM_CHUNKS = 10_000
const EXTENSIBLE = 0xfffe

function parseFormat(bytes: Uint8Array): WaveFormat {
  if (bytes.length < 16) throw undecodable('fmt chunk shorter than 16 bytes')
  const view = viewOf(bytes)
  const tag = view.getUint16(0, true)
  return {
    formatTag: tag === EXTENSIBLE && bytes.length >= 26 ? view.getUint16(24, true) : tag,
    channels: view.getUint16(2, true),
    sampleRateHz: view.getUint32(4, true),
    bytesPerSecond: view.getUint32(8, true),
    blockBytes: view.getUint16(12, true),
    bitsPerSample: view.getUint16(14, true),
  }
}

/** Chunk sizes that RF64 keeps in its `ds64` chunk because 32 bits are too few. */
async function readLongSizes(source: ByteSource, offset: number, bytes: number) {
  const chunk = await source.readAt(offset, Math.min(bytes, 28))
  if (chunk.length < 28) throw undecodable('ds64 chunk too short')
  const dataBytes = Number(viewOf(chunk).getBigUint64(8, true))
  if (!Number.isSafeInteger(dataBytes)) throw absurdHeader('ds64 data size')
  return dataBytes
}

/** Refuses what would make a decoder allocate without limit; real recorders never write it. */
export function assertPlausible(channels: number, sampleRateHz: number): void {
  if (channels < 1 || channels > 32) throw absurdHeader(`${channels} channels`)
  if (sampleRateHz < 2000 || sampleRateHz > 384_000) throw absurdHeader(`${sampleRateHz} Hz`)
}

/**
 * Walks the chunks of a WAV, RF64 or BW64 file in whatever order they stand. Chunks of odd size are padded to even
 * length; a writer that forgets the pad is tolerated, as are sizes that were never filled in.
 * @throws AudioError `undecodable` without `fmt ` or `data`, `absurd-header` on impossible values.
 */
export async function readWaveLayout(source: ByteSource): Promise<WaveLayout> {
  let format: WaveFormat | null = null
  let longDataBytes: number | null = null
  let data: { offset: number; declared: number | null } | null = null
  let broadcastExtension: WaveLayout['broadcastExtension'] = null
  let position = 12
  for (let count = 0; position + 8 <= source.sizeBytes && count < MAXIMUM_CHUNKS; count++) {
    const header = await source.readAt(position, 8)
    const size = viewOf(header).getUint32(4, true)
    const body = position + 8
    let chunkBytes = size
    if (hasText(header, 0, 'ds64')) longDataBytes = await readLongSizes(source, body, size)
    else if (hasText(header, 0, 'fmt ')) format = parseFormat(await source.readAt(body, Math.min(size, 40)))
    else if (hasText(header, 0, 'bext')) broadcastExtension = { offset: body, bytes: size }
    else if (hasText(header, 0, 'data')) {
      const declared = size === UNSET_SIZE ? longDataBytes : size === 0 ? null : size
      data ??= { offset: body, declared }
      chunkBytes = size === 0 ? 0 : (declared ?? source.sizeBytes)
      // Size 0 with bytes after it: either really empty, or a recorder that is still writing.
      if (size === 0 && !(await isChunkStart(source, body))) chunkBytes = source.sizeBytes
      else if (size === 0) data.declared = 0
    }
    position = body + chunkBytes
    // Odd chunks are padded, but some writers forget: the next chunk's name tells which.
    if (chunkBytes % 2 === 1 && !(await isChunkStart(source, position))) position += 1
  }
  if (!format) throw undecodable('no fmt chunk')
  if (!data) throw undecodable('no data chunk')
  assertPlausible(format.channels, format.sampleRateHz)
  const present = Math.max(0, source.sizeBytes - data.offset)
  const declared = data.declared
  return {
    format,
    dataOffset: data.offset,
    dataBytes: declared === null ? present : Math.min(declared, present),
    declaredDataBytes: declared,
    broadcastExtension,
  }
}

async function isChunkStart(source: ByteSource, position: number): Promise<boolean> {
  const id = await source.readAt(position, 4)
  return id.length === 4 && id.every((byte) => byte >= 0x20 && byte < 0x7f)
}
