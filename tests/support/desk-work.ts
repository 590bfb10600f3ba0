import { openAsBlob } from 'node:fs'
import { basename } from 'node:path'
import { waitUntil } from '@fieldfare/launcher'
import {
  getLog,
  listReferenceAudio,
  uploadLog,
  uploadReferenceAudio,
  type RecordingId,
  type ReferenceAudioView,
  type StationId,
  type StationLogView,
} from '@fieldfare/contracts'
import type { TestClient } from './test-client.ts'

/** What people at stations and at the desk do over HTTP, for tests that need it done before they begin. */

/** A form with a file of the disk in it. */
export async function fileForm(
  path: string,
  fields: Record<string, string> = {},
  fileName = basename(path),
): Promise<FormData> {
  const form = new FormData()
  for (const [name, value] of Object.entries(fields)) form.set(name, value)
  form.set('file', await openAsBlob(path), fileName)
  return form
}

/** Sends reference audio of a recording and waits until a worker has dealt with it. */
export async function sendReference(
  clerk: TestClient,
  recordingId: RecordingId,
  path: string,
): Promise<ReferenceAudioView> {
  const sent = await clerk.json(uploadReferenceAudio, { form: await fileForm(path, { recordingId }) })
  return settledReference(clerk, sent)
}

export function settledReference(clerk: TestClient, sent: ReferenceAudioView): Promise<ReferenceAudioView> {
  return waitUntil(
    async () => {
      const query = { recordingId: sent.recording.id }
      const { items } = await clerk.json(listReferenceAudio, { query })
      const found = items.find(({ id }) => id === sent.id)
      return found?.status === 'ready' || found?.status === 'failed' ? found : null
    },
    { everyMs: 100, timeoutMs: 120_000, description: `the fingerprint of ${sent.fileName}` },
  )
}

export type LogToSend = {
  stationId: StationId
  path: string
  startedAtLocal: string
  timeZone: string
  fileName?: string
}

/** Sends a station log. */
export async function sendLog(uploader: TestClient, log: LogToSend): Promise<StationLogView> {
  const { stationId, path, startedAtLocal, timeZone, fileName } = log
  const form = await fileForm(path, { startedAtLocal, timeZone }, fileName)
  return uploader.json(uploadLog, { params: { stationId }, form })
}

/** The log once no worker has to do with it any more. */
export function settledLog(
  client: TestClient,
  logId: string,
  { timeoutMs = 120_000 } = {},
): Promise<StationLogView> {
  return waitUntil(
    async () => {
      const { log } = await client.json(getLog, { params: { logId } })
      return log.status === 'queued' || log.status === 'analysing' ? null : log
    },
    { everyMs: 100, timeoutMs, description: `log ${logId} settled` },
  )
}
