import { stat } from 'node:fs/promises'
import { describe, expect, it } from 'vitest'
import { readAll, sine, rmsDb } from '../testing/signals.ts'
import { renderSpeech } from '../synthesis/render-speech.ts'
import { useTemporaryFolder } from '../testing/temporary-folder.ts'
import { openAudioWriter, writeAudioFile } from './audio-writer.ts'

const file = useTemporaryFolder()
const RATE_HZ = 22_050

describe('writeAudioFile', () => {
  it('writes WAV samples within half a step of 16 bits', async () => {
    const samples = sine(440, 1, RATE_HZ)
    await writeAudioFile(file('tone.wav'), samples, RATE_HZ, { format: 'wav' })
    const read = await readAll(file('tone.wav'), { sampleRateHz: RATE_HZ, decoder: 'audio-decode' })
    expect(read.samples.length).toBe(samples.length)
    const error = read.samples.reduce(
      (most, value, i) => Math.max(most, Math.abs(value - (samples[i] ?? 0))),
      0,
    )
    expect(error).toBeLessThan(1.1 / 32_768)
    expect((await stat(file('tone.wav'))).size).toBe(44 + 2 * samples.length)
  })

  it('holds what is beyond full scale at full scale', async () => {
    await writeAudioFile(file('loud.wav'), Float32Array.of(3, -3, 0), RATE_HZ, { format: 'wav' })
    const { samples } = await readAll(file('loud.wav'), { sampleRateHz: RATE_HZ, decoder: 'audio-decode' })
    expect(samples[0]).toBeCloseTo(1, 3)
    expect(samples[1]).toBeCloseTo(-1, 3)
  })

  it('obeys the bit rate', async () => {
    const tone = sine(440, 10, RATE_HZ)
    await writeAudioFile(file('small.mp3'), tone, RATE_HZ, { format: 'mp3', bitRate: 32_000 })
    await writeAudioFile(file('large.mp3'), tone, RATE_HZ, { format: 'mp3', bitRate: 128_000 })
    expect((await stat(file('small.mp3'))).size).toBeLessThan(45_000)
    expect((await stat(file('large.mp3'))).size).toBeGreaterThan(150_000)
  })

  it.each(['wav', 'mp3'] as const)('fails in words for %s where nothing can be written', async (format) => {
    const writing = writeAudioFile(file('no/such/folder.x'), sine(440, 1, RATE_HZ), RATE_HZ, { format })
    await expect(writing).rejects.toMatchObject({ name: 'AudioError', code: 'encoding-failed' })
  })

  it('removes the file when it is given up', async () => {
    const writer = await openAudioWriter(file('given-up.mp3'), RATE_HZ, { format: 'mp3' })
    await writer.write(sine(440, 1, RATE_HZ))
    await writer.discard()
    await expect(stat(file('given-up.mp3'))).rejects.toMatchObject({ code: 'ENOENT' })
  })
})

describe('renderSpeech', () => {
  it('speaks at a steady level', async () => {
    const speech = await renderSpeech('Good morning, and welcome back.', {
      name: 'en-gb',
      sampleRateHz: RATE_HZ,
    })
    if (speech === null) throw new Error('espeak-ng is needed for this test')
    expect(speech.length / RATE_HZ).toBeGreaterThan(1)
    expect(rmsDb(speech)).toBeGreaterThan(-24)
    expect(Math.max(...speech)).toBeLessThan(0.93)
  })

  it('says so when there is no such voice', async () => {
    await expect(renderSpeech('Hello', { name: 'nobody', sampleRateHz: RATE_HZ })).rejects.toMatchObject({
      name: 'AudioError',
    })
  })
})
