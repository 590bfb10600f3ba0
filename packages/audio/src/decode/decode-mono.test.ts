import { readFile, writeFile } from 'node:fs/promises'
import { beforeAll, describe, expect, it } from 'vitest'
import { writeAudioFile, type EncodingFormat } from '../encode/audio-writer.ts'
import { probeAudio } from '../probe.ts'
import { resample } from '../resample/resampler.ts'
import { decodeMono } from './decode-mono.ts'
import { isSameSound, lagOf, readAll, unevenNoise } from '../testing/signals.ts'
import { useTemporaryFolder } from '../testing/temporary-folder.ts'

const RATE_HZ = 44_100
const WANTED_HZ = 8000
const SECONDS = 6
const MILLISECONDS_3 = 24

const FORMATS: readonly (readonly [EncodingFormat, string])[] = [
  ['wav', 'wav'],
  ['mp3', 'mp3'],
  ['flac', 'flac'],
  ['ogg', 'ogg-vorbis'],
  ['opus', 'ogg-opus'],
  ['m4a', 'm4a'],
]

const LOSSLESS = new Set<EncodingFormat>(['wav', 'flac'])

const file = useTemporaryFolder()
const original = unevenNoise(SECONDS, RATE_HZ)
const expected = resample(original, RATE_HZ, WANTED_HZ)

beforeAll(async () => {
  for (const [format] of FORMATS) await writeAudioFile(file(`noise.${format}`), original, RATE_HZ, { format })
})

describe('decodeMono', () => {
  it.each(FORMATS)('gives back a recording written as %s, in time and complete', async (format, id) => {
    const { samples, summary } = await readAll(file(`noise.${format}`), { sampleRateHz: WANTED_HZ })
    expect(summary).toMatchObject({ format: { id }, isTruncated: false, isSilent: false, problem: null })
    expect(summary?.samples).toBe(samples.length)
    expect(Math.abs(samples.length / WANTED_HZ - SECONDS)).toBeLessThan(0.03)
    const { lag, fit } = lagOf(samples, expected, 400)
    expect(Math.abs(lag)).toBeLessThanOrEqual(MILLISECONDS_3)
    // Two good resamplers still differ between 3.6 and 4.4 kHz, where one rolls off; and a lossy codec changes noise,
    // the hardest signal there is.
    expect(fit).toBeGreaterThan(LOSSLESS.has(format) ? 0.995 : 0.95)
  })

  it.each(FORMATS.filter(([format]) => format !== 'm4a'))(
    'gives the same of %s, to a few milliseconds, without ffmpeg',
    async (format) => {
      const path = file(`noise.${format}`)
      const own = await readAll(path, { sampleRateHz: WANTED_HZ, decoder: 'audio-decode' })
      const theirs = await readAll(path, { sampleRateHz: WANTED_HZ, decoder: 'ffmpeg' })
      expect(own.summary?.decoder).toBe('audio-decode')
      expect(theirs.summary?.decoder).toBe('ffmpeg')
      expect(Math.abs(own.samples.length - theirs.samples.length)).toBeLessThanOrEqual(MILLISECONDS_3)
      const { lag, fit } = lagOf(own.samples, theirs.samples, 100)
      expect(Math.abs(lag)).toBeLessThanOrEqual(MILLISECONDS_3)
      expect(fit).toBeGreaterThan(0.99)
    },
  )

  it.each(FORMATS)('probes %s as what it is', async (format, id) => {
    const probe = await probeAudio(file(`noise.${format}`))
    expect(probe).toMatchObject({ format: { id }, channels: 1 })
    expect(Math.abs(probe.durationMs - SECONDS * 1000)).toBeLessThan(60)
  })

  it('gives the same samples every time', async () => {
    const first = await readAll(file('noise.mp3'), { sampleRateHz: WANTED_HZ })
    const second = await readAll(file('noise.mp3'), { sampleRateHz: WANTED_HZ })
    expect(isSameSound(first.samples, second.samples)).toBe(true)
  })

  it.each(['wav', 'mp3', 'flac', 'ogg', 'opus'])(
    'decodes what there is of a cut-off %s file and says that the end is missing',
    async (format) => {
      const bytes = await readFile(file(`noise.${format}`))
      await writeFile(file(`cut.${format}`), bytes.subarray(0, Math.round(bytes.length * 0.6)))
      const { samples, summary } = await readAll(file(`cut.${format}`), { sampleRateHz: WANTED_HZ })
      expect(summary?.isTruncated).toBe(true)
      expect(samples.length / WANTED_HZ).toBeGreaterThan(SECONDS * 0.4)
      expect(samples.length / WANTED_HZ).toBeLessThan(SECONDS * 0.8)
      expect(Math.abs(lagOf(samples, expected.subarray(0, samples.length), 200).lag)).toBeLessThanOrEqual(
        MILLISECONDS_3,
      )
    },
  )

  it('decodes what there is of a cut-off M4A file whose index stands first', async () => {
    const bytes = await readFile(file('noise.m4a'))
    await writeFile(file('cut.m4a'), bytes.subarray(0, Math.round(bytes.length * 0.6)))
    const { samples, summary } = await readAll(file('cut.m4a'), { sampleRateHz: WANTED_HZ })
    expect(summary?.isTruncated).toBe(true)
    expect(samples.length).toBeGreaterThan(0)
  })

  it('says that a recording is silent', async () => {
    await writeAudioFile(file('silent.wav'), new Float32Array(RATE_HZ), RATE_HZ, { format: 'wav' })
    const { summary } = await readAll(file('silent.wav'), { sampleRateHz: WANTED_HZ })
    expect(summary).toMatchObject({ isSilent: true, peak: 0, durationMs: 1000 })
  })

  it('stops when it is told to, with the reason given', async () => {
    const controller = new AbortController()
    const reason = new Error('no longer wanted')
    const reading = async () => {
      const { signal } = controller
      const blocks = await readAll(file('noise.mp3'), { sampleRateHz: WANTED_HZ, signal })
      return blocks.samples.length
    }
    controller.abort(reason)
    await expect(reading()).rejects.toBe(reason)
  })

  it('ends its child process when aborted or left half-way', async () => {
    const children = () => process.getActiveResourcesInfo().filter((name) => name === 'ProcessWrap').length
    const controller = new AbortController()
    const { signal } = controller
    const reading = decodeMono(file('noise.m4a'), { sampleRateHz: 192_000, signal })[Symbol.asyncIterator]()
    await reading.next()
    expect(children()).toBe(1)
    controller.abort()
    await expect(reading.next().then(() => reading.next())).rejects.toThrow('aborted')
    expect(children()).toBe(0)
    for await (const block of decodeMono(file('noise.m4a'), { sampleRateHz: 192_000 })) {
      expect(block.length).toBeGreaterThan(0)
      break
    }
    expect(children()).toBe(0)
  })

  it('refuses a recording longer than allowed', async () => {
    const reading = readAll(file('noise.flac'), { sampleRateHz: WANTED_HZ, maximumDurationMs: 2000 })
    await expect(reading).rejects.toMatchObject({ code: 'too-long' })
  })
})
