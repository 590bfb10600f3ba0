import { createWriteStream } from 'node:fs'
import { readFile } from 'node:fs/promises'
import { beforeAll, describe, expect, it } from 'vitest'
import { cutClip } from './cut-clip.ts'
import { writeAudioFile } from './encode/audio-writer.ts'
import { probeAudio } from './probe.ts'
import { lagOf, readAll, unevenNoise } from './testing/signals.ts'
import { useTemporaryFolder } from './testing/temporary-folder.ts'

const file = useTemporaryFolder()
const RATE_HZ = 8000
const original = unevenNoise(20, RATE_HZ)

beforeAll(async () => {
  for (const format of ['wav', 'mp3', 'm4a', 'ogg'] as const) {
    await writeAudioFile(file(`log.${format}`), original, RATE_HZ, { format })
  }
})

describe('cutClip', () => {
  it.each(['wav', 'mp3', 'm4a', 'ogg'])('cuts the right seconds out of a %s log', async (format) => {
    const range = { startSeconds: 7.25, durationSeconds: 4 }
    const clip = await cutClip(file(`log.${format}`), range, file('clip.wav'), { format: 'wav' })
    expect(clip.mediaType).toBe('audio/wav')
    const { samples, summary } = await readAll(file('clip.wav'), { sampleRateHz: RATE_HZ })
    expect(summary?.durationMs).toBe(4000)
    const { lag, fit } = lagOf(samples, original.subarray(7.25 * RATE_HZ, 11.25 * RATE_HZ), 400)
    expect(Math.abs(lag) / RATE_HZ).toBeLessThan(0.03)
    expect(fit).toBeGreaterThan(0.9)
  })

  it('writes MP3 into a stream, and ends with the recording', async () => {
    const range = { startSeconds: 18, durationSeconds: 10 }
    const { bytes, mediaType } = await cutClip(file('log.wav'), range, createWriteStream(file('clip.mp3')))
    expect(mediaType).toBe('audio/mpeg')
    expect((await readFile(file('clip.mp3'))).length).toBe(bytes)
    const { format, durationMs } = await probeAudio(file('clip.mp3'))
    expect(format.id).toBe('mp3')
    expect(Math.abs(durationMs - 2000)).toBeLessThan(120)
  })

  it('says when the recording ends before the clip begins', async () => {
    const cutting = cutClip(file('log.wav'), { startSeconds: 60, durationSeconds: 5 }, file('none.mp3'))
    await expect(cutting).rejects.toMatchObject({ code: 'no-samples' })
  })

  it.each([
    [-1, 5],
    [0, 0],
    [0, 10_000],
    [Number.NaN, 5],
  ])('refuses to cut from %d for %d seconds', async (startSeconds, durationSeconds) => {
    const cutting = cutClip(file('log.wav'), { startSeconds, durationSeconds }, file('none.mp3'))
    await expect(cutting).rejects.toThrow(RangeError)
  })
})
