import { open, type FileHandle } from 'node:fs/promises'
import { fileTypeFromBuffer } from 'file-type'

/** Recorders cut streams wherever they stand: the first whole frame may come later, at most this far in. */
const FRAME_SEARCH_BYTES = 8192
const HEAD_BYTES = 65_536
const ID3_HEADER_BYTES = 10

const AUDIO_KINDS: Readonly<Record<string, string>> = {
  mp3: 'MP3',
  mp2: 'MPEG layer II',
  wav: 'WAV',
  flac: 'FLAC',
  ogg: 'Ogg Vorbis',
  opus: 'Ogg Opus',
  oga: 'Ogg FLAC',
  m4a: 'M4A (MPEG-4 audio)',
  m4b: 'M4A (MPEG-4 audio)',
  f4a: 'M4A (MPEG-4 audio)',
  mp4: 'M4A (MPEG-4 audio)',
  aac: 'AAC (ADTS)',
}

/** What a file turned out to be by its bytes, never by its name. */
export type FileKind =
  | { kind: 'audio'; label: string }
  | { kind: 'other'; mediaType: string }
  | { kind: 'text' }
  | { kind: 'unknown' }

async function readBytes(file: FileHandle, position: number, length: number): Promise<Buffer> {
  const { buffer, bytesRead } = await file.read(Buffer.alloc(length), 0, length, position)
  return buffer.subarray(0, bytesRead)
}

/** Length of an ID3v2 tag, four times seven bits (id3.org, ID3v2.4 structure, 3.1); 0 where there is none. */
function id3Bytes(header: Buffer): number {
  if (header.length < ID3_HEADER_BYTES || header.toString('latin1', 0, 3) !== 'ID3') return 0
  const size = [6, 7, 8, 9].reduce((sum, at) => sum * 128 + (header.readUInt8(at) & 0x7f), 0)
  const hasFooter = (header.readUInt8(5) & 0x10) !== 0
  return ID3_HEADER_BYTES + size + (hasFooter ? ID3_HEADER_BYTES : 0)
}

/** The first bytes behind tags with cover pictures, which may be longer than what is read. */
async function readHead(path: string): Promise<Buffer> {
  const file = await open(path, 'r')
  try {
    let start = 0
    for (;;) {
      const tagBytes = id3Bytes(await readBytes(file, start, ID3_HEADER_BYTES))
      if (tagBytes === 0) return await readBytes(file, start, HEAD_BYTES)
      start += tagBytes
    }
  } finally {
    await file.close()
  }
}

/** RF64 and BW64 are WAV files with sizes beyond 4 GiB (EBU Tech 3306, ITU-R BS.2088). */
function isLongWave(head: Buffer): boolean {
  return ['RF64', 'BW64'].includes(head.toString('latin1', 0, 4)) && head.toString('latin1', 8, 12) === 'WAVE'
}

function looksLikeText(head: Buffer): boolean {
  const hasByteOrderMark = (head[0] === 0xff && head[1] === 0xfe) || (head[0] === 0xfe && head[1] === 0xff)
  return hasByteOrderMark || head.every((byte) => (byte >= 0x20 && byte < 0x7f) || [9, 10, 13].includes(byte))
}

export async function kindOfFile(path: string): Promise<FileKind> {
  const head = await readHead(path)
  if (isLongWave(head)) return { kind: 'audio', label: 'WAV' }
  const found = await fileTypeFromBuffer(head, { mpegOffsetTolerance: FRAME_SEARCH_BYTES })
  if (found === undefined) return looksLikeText(head) ? { kind: 'text' } : { kind: 'unknown' }
  // A text in UTF-16 begins with the same bits as a frame of MPEG layer I, which nobody sends.
  if (found.ext === 'mp1') return looksLikeText(head) ? { kind: 'text' } : { kind: 'unknown' }
  const label = AUDIO_KINDS[found.ext]
  return label === undefined ? { kind: 'other', mediaType: found.mime } : { kind: 'audio', label }
}
