import { cutClip } from '@fieldfare/audio'
import { clipStorageKey, findClipAudio } from '@fieldfare/database'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { JobRefused, type JobHandler } from './job-context.ts'

/** Long enough to decide by ear, short enough to load at once. */
const CLIP_SECONDS = 30

/** Cuts a clip of a log or of its reference, both beginning at the same moment of the music. */
export const cutClipJob: JobHandler<'cut-clip'> = {
  async run({ database, storage, finish }, { detectionId, source, fromSeconds }) {
    const audio = await findClipAudio(database, detectionId)
    if (audio === null) throw new JobRefused('The detection is not known.')
    const storageKey = source === 'log' ? audio.logStorageKey : audio.referenceStorageKey
    if (storageKey === null) throw new JobRefused('The audio is no longer kept.')
    const left = audio.durationMs / 1000 - fromSeconds
    if (left <= 0) throw new JobRefused('The clip would begin after the end of the play.')
    const startSeconds =
      source === 'log'
        ? audio.logStartMs / 1000 + fromSeconds
        : audio.referenceStartMs / 1000 + fromSeconds * audio.speedRatio
    const directory = await mkdtemp(join(tmpdir(), 'fieldfare-clip-'))
    try {
      const filePath = join(directory, 'clip.mp3')
      await storage.withLocalFile(storageKey, (path) =>
        cutClip(path, { startSeconds, durationSeconds: Math.min(CLIP_SECONDS, left) }, filePath),
      )
      await storage.put(clipStorageKey({ detectionId, source, fromSeconds }), { filePath })
    } finally {
      await rm(directory, { recursive: true, force: true })
    }
    await finish(async () => undefined)
  },
}
