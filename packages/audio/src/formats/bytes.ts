import { open, type FileHandle } from 'node:fs/promises'
import { AudioError } from '../audio-error.ts'

/** Whether the ASCII text stands at this offset. */
export function hasText(bytes: Uint8Array, offset: number, text: string): boolean {
  if (offset < 0 || offset + text.length > bytes.length) return false
  for (let i = 0; i < text.length; i++) if (bytes[offset + i] !== text.charCodeAt(i)) return false
  return true
}

/** A view for multi-byte fields that respects the array's own offset. */
export function viewOf(bytes: Uint8Array): DataView {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
}

/** Random access to a file, for reading headers without loading the file. */
export type ByteSource = {
  readonly sizeBytes: number
  /** Up to `length` bytes from `position`; shorter at the end of the file. */
  readAt: (position: number, length: number) => Promise<Uint8Array<ArrayBuffer>>
  close: () => Promise<void>
}

async function readFully(handle: FileHandle, position: number, length: number) {
  const bytes = new Uint8Array(length)
  let filled = 0
  while (filled < length) {
    const { bytesRead } = await handle.read(bytes, filled, length - filled, position + filled)
    if (bytesRead === 0) break
    filled += bytesRead
  }
  return bytes.subarray(0, filled)
}

/** @throws AudioError `unreadable-file` when the path is missing, not readable or not a file. */
export async function openByteSource(path: string): Promise<ByteSource> {
  const unreadable = (cause: unknown) =>
    new AudioError(
      'unreadable-file',
      'The file could not be opened on the server. Please send it again.',
      String(cause),
      { cause },
    )
  const handle = await open(path, 'r').catch((cause: unknown) => {
    throw unreadable(cause)
  })
  const stat = await handle.stat()
  if (!stat.isFile()) {
    await handle.close()
    throw unreadable('not a regular file')
  }
  return {
    sizeBytes: stat.size,
    readAt: (position, length) =>
      readFully(handle, position, Math.max(0, Math.min(length, stat.size - position))),
    close: () => handle.close(),
  }
}
