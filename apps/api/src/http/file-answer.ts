import { Readable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { ObjectNotFound, type ObjectStorage } from '@fieldfare/database'
import type { Request, Response } from 'express'
import { notFound } from './app-error.ts'

/** A file as a handler answers it: made on the way, or kept in storage (then ranges of it can be asked for). */
export type FileAnswer = {
  mediaType: string
  /** Suggested name; the server makes it safe. */
  fileName: string
  disposition: 'attachment' | 'inline'
  content: { kind: 'stream'; stream: Readable } | { kind: 'stored'; storage: ObjectStorage; key: string }
}

/** A text or stream made for this request, such as a CSV export. */
export function streamedFile(file: { mediaType: string; fileName: string; stream: Readable }): FileAnswer {
  return { ...file, disposition: 'attachment', content: { kind: 'stream', stream: file.stream } }
}

/** A text of moderate size. */
export function textFile(file: {
  mediaType: string
  fileName: string
  text: string
  disposition?: 'attachment' | 'inline'
}): FileAnswer {
  return {
    mediaType: file.mediaType,
    fileName: file.fileName,
    disposition: file.disposition ?? 'attachment',
    content: { kind: 'stream', stream: Readable.from([Buffer.from(file.text, 'utf8')]) },
  }
}

/** A file in storage; audio is answered inline and in ranges, so that a player can seek. */
export function storedFile(file: {
  mediaType: string
  fileName: string
  disposition: 'attachment' | 'inline'
  storage: ObjectStorage
  key: string
}): FileAnswer {
  const { storage, key, ...rest } = file
  return { ...rest, content: { kind: 'stored', storage, key } }
}

function contentDisposition(file: FileAnswer): string {
  const plain = file.fileName.replaceAll(/[^A-Za-z0-9._-]+/g, '-')
  const encoded = encodeURIComponent(file.fileName).replaceAll(
    /['()*]/g,
    (character) => `%${character.charCodeAt(0).toString(16).toUpperCase()}`,
  )
  return `${file.disposition}; filename="${plain}"; filename*=UTF-8''${encoded}`
}

type Range = { first: number; last: number }

/** One range of bytes; several, or none that makes sense, count as not asked for. */
export function parseRange(header: string | undefined, sizeBytes: number): Range | 'outside' | null {
  const match = /^bytes=(\d{0,15})-(\d{0,15})$/.exec(header ?? '')
  if (match === null) return null
  const [, from = '', to = ''] = match
  if (from === '' && to === '') return null
  const first = from === '' ? Math.max(0, sizeBytes - Number(to)) : Number(from)
  const last = from === '' || to === '' ? sizeBytes - 1 : Math.min(Number(to), sizeBytes - 1)
  if (from !== '' && to !== '' && Number(to) < Number(from)) return null
  return first >= sizeBytes || first > last ? 'outside' : { first, last }
}

async function openStored(
  content: { storage: ObjectStorage; key: string },
  request: Request,
  response: Response,
): Promise<Readable | null> {
  const { storage, key } = content
  const stored = await storage.stat(key)
  if (stored === null) throw notFound('This file')
  response.setHeader('accept-ranges', 'bytes')
  const range = parseRange(request.headers.range, stored.sizeBytes)
  if (range === 'outside') {
    response.status(416).setHeader('content-range', `bytes */${stored.sizeBytes}`)
    response.end()
    return null
  }
  if (range === null) {
    response.setHeader('content-length', stored.sizeBytes)
    return storage.read(key)
  }
  response.status(206)
  response.setHeader('content-range', `bytes ${range.first}-${range.last}/${stored.sizeBytes}`)
  response.setHeader('content-length', range.last - range.first + 1)
  return storage.readRange(key, range)
}

function isClosedEarly(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === 'ERR_STREAM_PREMATURE_CLOSE'
}

/** Sends the file with back-pressure. A viewer who leaves early ends it quietly. */
export async function sendFile(file: FileAnswer, request: Request, response: Response): Promise<void> {
  response.setHeader('content-type', file.mediaType)
  response.setHeader('content-disposition', contentDisposition(file))
  response.setHeader('cache-control', 'private, no-store')
  try {
    const stream =
      file.content.kind === 'stream' ? file.content.stream : await openStored(file.content, request, response)
    if (stream === null) return
    await pipeline(stream, response)
  } catch (error) {
    if (isClosedEarly(error)) return
    if (!response.headersSent) {
      for (const name of ['content-disposition', 'content-length', 'content-range', 'accept-ranges']) {
        response.removeHeader(name)
      }
      response.status(200)
    }
    if (error instanceof ObjectNotFound) throw notFound('This file')
    throw error
  }
}
