import { readFile, writeFile } from 'node:fs/promises'
import { beforeAll, describe, expect, it } from 'vitest'
import { AudioError } from '../audio-error.ts'
import { writeAudioFile } from '../encode/audio-writer.ts'
import { waveHeader } from '../encode/wave-header.ts'
import { extensionMatchesFormat } from '../formats/audio-format.ts'
import { viewOf } from '../formats/bytes.ts'
import { probeAudio } from '../probe.ts'
import { readAll, sine } from '../testing/signals.ts'
import { useTemporaryFolder } from '../testing/temporary-folder.ts'

const file = useTemporaryFolder()
const RATE_HZ = 8000

/** A one-pixel PNG up to its header chunk, then bytes that are no audio. */
const PNG = Uint8Array.from([
  0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 0x49, 0x48, 0x44, 0x52,
])

function changedHeader(change: (view: DataView) => void): Uint8Array {
  const bytes = new Uint8Array(44 + 16_000)
  bytes.set(waveHeader(RATE_HZ, 16_000))
  change(viewOf(bytes))
  return bytes
}

async function failureOf(name: string): Promise<AudioError> {
  const error: unknown = await readAll(file(name), { sampleRateHz: RATE_HZ }).catch((cause: unknown) => cause)
  if (error instanceof AudioError) return error
  throw new Error(`${name} was not refused with an AudioError`)
}

beforeAll(() => writeAudioFile(file('tone.mp3'), sine(440, 3, 44_100), 44_100, { format: 'mp3' }))

describe('bad input', () => {
  it.each([
    ['an empty file', new Uint8Array(0), 'empty-file', 'empty'],
    [
      'a text',
      new TextEncoder().encode('Playlist for Monday\n'.repeat(500)),
      'unrecognised-format',
      'not an audio',
    ],
    ['an image', PNG, 'unrecognised-format', 'not an audio'],
    ['zeros', new Uint8Array(100_000), 'unrecognised-format', 'not an audio'],
    ['a WAV without samples', waveHeader(RATE_HZ, 0), 'no-samples', 'length is zero'],
    [
      'a WAV of 0 Hz',
      changedHeader((view) => view.setUint32(24, 0, true)),
      'absurd-header',
      'describes itself',
    ],
    [
      'a WAV of 4 GHz',
      changedHeader((view) => view.setUint32(24, 4e9, true)),
      'absurd-header',
      'describes itself',
    ],
    [
      'a WAV of no channels',
      changedHeader((view) => view.setUint16(22, 0, true)),
      'absurd-header',
      'describes',
    ],
    [
      'a WAV of 65,535 channels',
      changedHeader((view) => view.setUint16(22, 65_535, true)),
      'absurd-header',
      'des',
    ],
    ['a WAV cut off in its header', waveHeader(RATE_HZ, 100).subarray(0, 30), 'undecodable', 'damaged'],
    ['an MP3 tag alone', Uint8Array.from([0x49, 0x44, 0x33, 4, 0, 0, 0, 0, 0, 0]), 'undecodable', 'damaged'],
    ['an Ogg page header alone', new TextEncoder().encode('OggS'), 'unrecognised-format', 'not an audio'],
    ['a FLAC marker alone', new TextEncoder().encode('fLaC'), 'undecodable', 'damaged'],
    ['an M4A marker alone', new TextEncoder().encode('\0\0\0\x18ftypM4A \0\0\0\0'), 'undecodable', ' '],
  ])('refuses %s in plain words', async (_name, bytes, code, words) => {
    await writeFile(file('bad.mp3'), bytes)
    const error = await failureOf('bad.mp3')
    expect(error.code).toBe(code)
    expect(error.userMessage).toContain(words)
    expect(error.userMessage).not.toMatch(/ffmpeg|undefined|0x|\/tmp/)
  })

  it('refuses a missing file and a folder', async () => {
    expect((await failureOf('nowhere.mp3')).code).toBe('unreadable-file')
    expect((await failureOf('.')).code).toBe('unreadable-file')
  })

  it('reads an MP3 called .wav, and the name can be told not to fit', async () => {
    await writeFile(file('tone.wav'), await readFile(file('tone.mp3')))
    const { format } = await probeAudio(file('tone.wav'))
    expect(format.id).toBe('mp3')
    expect(extensionMatchesFormat('tone.wav', format)).toBe(false)
    expect(extensionMatchesFormat('tone.mp3', format)).toBe(true)
    const { summary } = await readAll(file('tone.wav'), { sampleRateHz: RATE_HZ })
    expect(summary?.durationMs).toBeGreaterThan(2900)
  })

  it('reads an MP3 behind garbage', async () => {
    const garbage = new Uint8Array(300_000).fill(0x55)
    await writeFile(file('late.mp3'), Buffer.concat([garbage, await readFile(file('tone.mp3'))]))
    const { summary } = await readAll(file('late.mp3'), { sampleRateHz: RATE_HZ })
    expect(Math.abs((summary?.durationMs ?? 0) - 3000)).toBeLessThan(80)
  })

  it('reads a WAV whose recorder never filled in the sizes', async () => {
    const bytes = changedHeader((view) => {
      view.setUint32(4, 0xffff_ffff, true)
      view.setUint32(40, 0xffff_ffff, true)
    })
    await writeFile(file('growing.wav'), bytes)
    const { summary } = await readAll(file('growing.wav'), { sampleRateHz: RATE_HZ })
    expect(summary).toMatchObject({ durationMs: 1000, isTruncated: false })
  })

  it('survives any damage inside a file', async () => {
    const bytes = Uint8Array.from(await readFile(file('tone.mp3')))
    for (let i = 0; i < bytes.length; i += 97) bytes[i] = (i * 31) & 255
    await writeFile(file('damaged.mp3'), bytes)
    const outcome = await readAll(file('damaged.mp3'), { sampleRateHz: RATE_HZ }).catch(
      (error: unknown) => error,
    )
    if (outcome instanceof Error) expect(outcome).toBeInstanceOf(AudioError)
    else expect(outcome).toMatchObject({ summary: { format: { id: 'mp3' } } })
  })
})
