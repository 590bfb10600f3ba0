import { randomUUID } from 'node:crypto'
import { mkdir, rm } from 'node:fs/promises'
import type { Request, Response } from 'express'
import multer from 'multer'
import { AppError } from './app-error.ts'

/** A file that came with a request. It is on disk until the request ends, then it is gone. */
export type UploadedFile = {
  path: string
  sizeBytes: number
  /** As the person's machine calls it: to show and to read a start time from, never to build a path of. */
  originalName: string
}

export type UploadRules = { field: string; directory: string; limitBytes: number }

const MULTER_DETAILS: Partial<Record<multer.ErrorCode, string>> = {
  LIMIT_UNEXPECTED_FILE: 'The request carries a file in a field that takes none.',
  LIMIT_FILE_COUNT: 'Send one file at a time.',
}

function describeLimit(limitBytes: number): string {
  const gibibytes = limitBytes / 1024 ** 3
  return gibibytes >= 1
    ? `${Number(gibibytes.toFixed(1))} GB`
    : `${Math.max(1, Math.floor(limitBytes / 1024 ** 2))} MB`
}

function translateUploadError(error: unknown, rules: UploadRules): Error {
  if (error instanceof multer.MulterError) {
    if (error.code === 'LIMIT_FILE_SIZE') {
      return new AppError('file-too-large', {
        detail: `A file may have at most ${describeLimit(rules.limitBytes)}.`,
      })
    }
    const detail = MULTER_DETAILS[error.code] ?? 'The form that carries the file could not be read.'
    return new AppError('malformed-request', { detail, logMessage: error.message, cause: error })
  }
  // What the multipart parser throws has no class of its own; a failure of the disk names the system call.
  if (error instanceof Error && 'syscall' in error) return error
  return new AppError('malformed-request', {
    detail: 'The upload broke off or could not be read. Send the file again.',
    logMessage: error instanceof Error ? error.message : 'the upload failed',
    cause: error,
  })
}

/** Streams one file and its text fields to disk, never holding the file in memory. */
export async function receiveUpload(
  request: Request,
  response: Response,
  rules: UploadRules,
): Promise<UploadedFile | null> {
  await mkdir(rules.directory, { recursive: true })
  const receive = multer({
    storage: multer.diskStorage({
      destination: rules.directory,
      filename: (_request, _file, done) => done(null, randomUUID()),
    }),
    limits: { fileSize: rules.limitBytes, files: 1, fields: 50, fieldSize: 64 * 1024, parts: 60 },
    defParamCharset: 'utf8',
  }).single(rules.field)
  await new Promise<void>((resolve, reject) => {
    receive(request, response, (error: unknown) => {
      if (error === undefined || error === null) resolve()
      else reject(translateUploadError(error, rules))
    })
  })
  const { file } = request
  return file === undefined
    ? null
    : { path: file.path, sizeBytes: file.size, originalName: file.originalname.slice(0, 300) }
}

export async function discardUpload(file: UploadedFile | null): Promise<void> {
  if (file !== null) await rm(file.path, { force: true })
}
