import { createHash } from 'node:crypto'
import { createReadStream } from 'node:fs'
import { pipeline } from 'node:stream/promises'
import { AppError } from '../http/app-error.ts'
import type { UploadedFile } from '../http/upload.ts'
import { kindOfFile } from './audio-kind.ts'

export type CheckedAudio = { format: string; sha256: Buffer }

const ACCEPTED = 'Send MP3, WAV, FLAC, Ogg (Vorbis or Opus), M4A or AAC.'

export function fileRefused(message: string): AppError {
  return new AppError('file-refused', { detail: message, fieldErrors: [{ path: 'file', message }] })
}

async function hashFile(path: string): Promise<Buffer> {
  const hash = createHash('sha256')
  await pipeline(createReadStream(path), hash)
  return hash.digest()
}

/**
 * Tells what was sent by its content and sums it up, a piece at a time. Whether it can be played to the end is found
 * out by the worker.
 *
 * @throws AppError file-refused, in plain words
 */
export async function checkAudioUpload(file: UploadedFile): Promise<CheckedAudio> {
  const name = `“${file.originalName}”`
  if (file.sizeBytes === 0)
    throw fileRefused(`${name} is empty. Check the recorder or the copy and send it again.`)
  const found = await kindOfFile(file.path)
  switch (found.kind) {
    case 'audio':
      return { format: found.label, sha256: await hashFile(file.path) }
    case 'text':
      throw fileRefused(`${name} is a text, not audio, whatever its name says. ${ACCEPTED}`)
    case 'other':
      throw fileRefused(`${name} is not audio but ${found.mediaType}. ${ACCEPTED}`)
    case 'unknown':
      throw fileRefused(`${name} is not audio of a kind that can be read. ${ACCEPTED}`)
  }
}
