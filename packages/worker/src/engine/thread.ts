import { AudioError } from '@fieldfare/audio'
import {
  buildIndexSegment,
  createIndex,
  decodeFingerprint,
  segmentFromBuffers,
  segmentToBuffers,
} from '@fieldfare/fingerprint'
import { parentPort } from 'node:worker_threads'
import { analyseAudio } from './analyse-audio.ts'
import { fingerprintAudio } from './fingerprint-audio.ts'
import type { IndexChange, ThreadMessage, ThreadRequest } from './messages.ts'

/** Runs in a thread of its own: signal processing never blocks the loop that talks to Redis and PostgreSQL. */
if (parentPort === null) throw new Error('This file is the body of a worker thread')
const port = parentPort
const index = createIndex()

function applyChanges(changes: readonly IndexChange[]): void {
  for (const change of changes) {
    if (change.kind === 'add') index.addSegment(segmentFromBuffers(change.segment))
    else index.removeRecording(change.recordingNumber)
  }
}

function send(message: ThreadMessage): void {
  port.postMessage(message)
}

async function run(request: ThreadRequest) {
  switch (request.task) {
    case 'fingerprint':
      return fingerprintAudio(request.path)
    case 'build-segment':
      return segmentToBuffers(
        buildIndexSegment(
          request.entries.map(({ recordingNumber, landmarks }) => ({
            recordingNumber,
            fingerprint: decodeFingerprint(landmarks),
          })),
        ),
      )
    case 'analyse':
      applyChanges(request.changes)
      return analyseAudio({
        path: request.path,
        index,
        onProgress: (doneSeconds) => send({ kind: 'progress', doneSeconds }),
      })
  }
}

port.on('message', (request: ThreadRequest) => {
  run(request).then(
    (result) => send({ kind: 'done', result }),
    (error: unknown) =>
      send({
        kind: 'failed',
        audioError: error instanceof AudioError ? { code: error.code, userMessage: error.userMessage } : null,
        message: error instanceof Error ? (error.stack ?? error.message) : String(error),
      }),
  )
})
