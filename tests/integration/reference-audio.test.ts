import { execFile } from 'node:child_process'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { promisify } from 'node:util'
import {
  getRecording,
  listReferenceAudio,
  retryReferenceAudio,
  uploadReferenceAudio,
} from '@fieldfare/contracts'
import { beforeAll, describe, expect, it } from 'vitest'
import { temporaryDirectory } from '../support/index.ts'
import { startTestApi, type TestApi } from '../support/test-api.ts'
import type { TestClient } from '../support/test-client.ts'
import { addRecording, anyIsrc, auditOf, formWith, toneWave } from './feature-data.ts'

const run = promisify(execFile)

let api: TestApi
let clerk: TestClient
let hertz = 300

beforeAll(async () => {
  api = await startTestApi()
  clerk = (await api.signInAs('clerk')).client
})

function freshTone(): Blob {
  hertz += 1
  return toneWave(1, hertz)
}

async function storedObjects(): Promise<number> {
  return (await api.dependencies.storage.usage()).objects
}

describe('reference audio', () => {
  it('is stored, on the record, queued and on the audit trail, all of them', async () => {
    const recordingId = await addRecording(api.database, { title: 'Referred' })
    const audio = await clerk.json(uploadReferenceAudio, {
      form: formWith(freshTone(), 'any name.wav', { recordingId }),
    })
    expect(audio).toMatchObject({
      recording: { id: recordingId, title: 'Referred' },
      fileName: 'any name.wav',
      format: 'WAV',
      status: 'waiting',
      durationSeconds: null,
    })
    expect(await api.dependencies.storage.stat(`reference-audio/${audio.id}`)).toMatchObject({
      sizeBytes: audio.sizeBytes,
    })
    const jobs = await api
      .database('jobs')
      .where({ dedupe_key: `fingerprint-reference-${audio.id}-1` })
      .select('kind', 'payload')
    expect(jobs).toEqual([{ kind: 'fingerprint-reference', payload: { referenceAudioId: audio.id } }])
    expect(await auditOf(api.database, recordingId)).toMatchObject([{ action: 'upload-reference-audio' }])
    expect((await clerk.json(getRecording, { params: { recordingId } })).referenceStatus).toBe('waiting')
  })

  it.each([
    ['mp3', 'MP3', []],
    ['mp2', 'MPEG layer II', []],
    ['flac', 'FLAC', []],
    ['ogg', 'Ogg Vorbis', ['-c:a', 'libvorbis']],
    ['opus', 'Ogg Opus', ['-c:a', 'libopus']],
    ['m4a', 'M4A (MPEG-4 audio)', []],
    ['mp4', 'M4A (MPEG-4 audio)', []],
    ['aac', 'AAC (ADTS)', []],
  ])('is accepted as %s, told by its content', async (extension, format, options) => {
    const path = join(await temporaryDirectory('formats'), `tone.${extension}`)
    await run('ffmpeg', ['-v', 'error', '-f', 'lavfi', '-i', 'sine=440:duration=2', ...options, path])
    const recordingId = await addRecording(api.database)
    // The name tells another kind, as happens when files are renamed.
    const form = formWith(new Blob([await readFile(path)]), 'tone.wav', { recordingId })
    expect(await clerk.json(uploadReferenceAudio, { form })).toMatchObject({ format })
  })

  it('finds its recording by the ISRC in the file name', async () => {
    const recordingId = await addRecording(api.database, { isrc: 'ZZREF2600047' })
    const form = formWith(freshTone(), '03 zz-ref-26-00047 Title.wav')
    expect((await clerk.json(uploadReferenceAudio, { form })).recording.id).toBe(recordingId)
  })

  it('is refused, saying what was looked for, when the name leads to no recording', async () => {
    const unknown = await clerk.problem(uploadReferenceAudio, {
      form: formWith(freshTone(), 'ZZREF2699999.wav'),
    })
    expect(unknown).toMatchObject({ code: 'file-refused', status: 422 })
    expect(unknown.detail).toContain('ZZ-REF-26-99999')
    const none = await clerk.problem(uploadReferenceAudio, { form: formWith(freshTone(), 'Title.wav') })
    expect(none.detail).toContain('No ISRC stands in the file name')
    const recordingId = '00000000-0000-4000-8000-000000000097'
    const nobody = await clerk.problem(uploadReferenceAudio, {
      form: formWith(freshTone(), 'x.wav', { recordingId }),
    })
    expect(nobody).toMatchObject({ status: 422, fieldErrors: [{ path: 'recordingId' }] })
  })

  it.each([
    ['empty', '', 'is empty'],
    ['a text called .mp3', 'Not a note of music.\n', 'is a text'],
    ['a PDF', '%PDF-1.7\n', 'application/pdf'],
  ])('is refused when it is %s, and leaves nothing', async (_what, content, words) => {
    const recordingId = await addRecording(api.database)
    const objects = await storedObjects()
    const problem = await clerk.problem(uploadReferenceAudio, {
      form: formWith(content, 'music.mp3', { recordingId }),
    })
    expect(problem).toMatchObject({ code: 'file-refused', fieldErrors: [{ path: 'file' }] })
    expect(problem.detail).toContain(words)
    expect(await storedObjects()).toBe(objects)
  })

  it('is taken once for one recording, however often and at once it is sent, and may serve another', async () => {
    const [recordingId, other] = [await addRecording(api.database), await addRecording(api.database)]
    const file = freshTone()
    const objects = await storedObjects()
    const send = (id: string) =>
      clerk.call(uploadReferenceAudio, { form: formWith(file, 'x.wav', { recordingId: id }) })
    const answers = await Promise.all([send(recordingId), send(recordingId), send(recordingId)])
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409])
    expect(await storedObjects()).toBe(objects + 1)
    expect((await send(other)).status).toBe(200)
  })

  it('is fingerprinted again only after a failure, by a job of its own', async () => {
    const recordingId = await addRecording(api.database, { isrc: anyIsrc() })
    const { id } = await clerk.json(uploadReferenceAudio, {
      form: formWith(freshTone(), 'x.wav', { recordingId }),
    })
    const params = { referenceAudioId: id }
    expect(await clerk.problem(retryReferenceAudio, { params })).toMatchObject({ code: 'conflict' })
    await api.database('reference_audio').where({ id }).update({ status: 'failed', failure: 'It broke off.' })
    const failed = await clerk.json(listReferenceAudio, { query: { status: 'failed', recordingId } })
    expect(failed.items).toMatchObject([{ id, failure: 'It broke off.' }])
    expect(await clerk.json(retryReferenceAudio, { params })).toMatchObject({
      status: 'waiting',
      failure: null,
    })
    const keys: { dedupe_key: string }[] = await api
      .database('jobs')
      .where('dedupe_key', 'like', `fingerprint-reference-${id}-%`)
      .orderBy('dedupe_key')
      .select('dedupe_key')
    expect(keys.map(({ dedupe_key: key }) => key.slice(-2))).toEqual(['-1', '-2'])
  })
})
