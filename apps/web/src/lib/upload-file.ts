import type { Endpoint, EndpointOutput } from '@fieldfare/contracts'
import type { z } from 'zod'
import { parseAnswer } from './api-client.ts'
import { connectionProblem, problemFromAnswer } from './api-problem.ts'
import { csrfHeader } from './csrf.ts'
import {
  endpointAddress,
  type AddressOptions,
  type LooseAddress,
  type QueryValue,
} from './endpoint-address.ts'
import { announceSessionEnd, refreshOnce } from './session-refresh.ts'

export type UploadProgress = { sentBytes: number; totalBytes: number; secondsLeft: number | null }

type UploadExtras = {
  file: File
  onProgress?: (progress: UploadProgress) => void
  signal?: AbortSignal
}

export type UploadFields<E extends Endpoint> = E extends { body: infer Schema extends z.ZodType }
  ? { fields: { [Name in keyof z.input<Schema>]: QueryValue } }
  : { fields?: undefined }

export type UploadOptions<E extends Endpoint> = AddressOptions<E> & UploadFields<E> & UploadExtras

type LooseUpload = LooseAddress & UploadExtras & { fields?: Record<string, QueryValue> | undefined }

/**
 * Sends one file with its text fields as multipart/form-data and reports how far it is.
 * XMLHttpRequest, because fetch cannot report what has been sent.
 * @throws ApiProblem; DOMException named AbortError when cancelled.
 */
export function uploadFile<E extends Endpoint>(
  endpoint: E,
  options: UploadOptions<E>,
): Promise<EndpointOutput<E>>
export async function uploadFile(endpoint: Endpoint, options: LooseUpload): Promise<unknown> {
  let answer = await sendForm(endpoint, options)
  if (answer.status === 401 && (await refreshOnce())) answer = await sendForm(endpoint, options)
  if (answer.status === 401) announceSessionEnd()
  if (answer.status < 200 || answer.status > 299) throw problemFromAnswer(answer.status, answer.body)
  return endpoint.answer.kind === 'json'
    ? parseAnswer(endpoint, endpoint.answer.schema, answer.body)
    : undefined
}

function sendForm(endpoint: Endpoint, options: LooseUpload): Promise<{ status: number; body: unknown }> {
  const { file, fields = {}, onProgress, signal } = options
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest()
    const startedAt = performance.now()
    request.open(endpoint.method, endpointAddress(endpoint, options))
    for (const [name, value] of Object.entries(csrfHeader())) request.setRequestHeader(name, value)
    request.upload.addEventListener('progress', ({ loaded, total }) => {
      onProgress?.({
        sentBytes: loaded,
        totalBytes: total,
        secondsLeft: secondsLeft(loaded, total, performance.now() - startedAt),
      })
    })
    request.addEventListener('load', () =>
      resolve({ status: request.status, body: readText(request.responseText) }),
    )
    request.addEventListener('error', () => reject(connectionProblem()))
    request.addEventListener('abort', () => reject(new DOMException('The upload was stopped.', 'AbortError')))
    signal?.addEventListener('abort', () => request.abort(), { once: true })
    request.send(formOf(endpoint, fields, file))
  })
}

/** Text fields go first: the server reads them before it takes the file. */
function formOf(endpoint: Endpoint, fields: Record<string, QueryValue>, file: File): FormData {
  const form = new FormData()
  for (const [name, value] of Object.entries(fields)) {
    if (value !== undefined && value !== null && value !== '') form.append(name, String(value))
  }
  form.append(endpoint.file?.field ?? 'file', file)
  return form
}

/** What remains at the average rate so far; unknown until a second has passed. */
export function secondsLeft(doneAmount: number, totalAmount: number, elapsedMs: number): number | null {
  if (doneAmount <= 0 || elapsedMs < 1000) return null
  return ((totalAmount - doneAmount) * elapsedMs) / doneAmount / 1000
}

function readText(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    // Not JSON: treated as an unreadable answer by the caller.
    return undefined
  }
}
