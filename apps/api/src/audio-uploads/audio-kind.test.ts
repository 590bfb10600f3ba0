import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { kindOfFile } from './audio-kind.ts'

let directory: string
beforeAll(async () => {
  directory = await mkdtemp(join(tmpdir(), 'audio-kind-'))
})
afterAll(() => rm(directory, { recursive: true, force: true }))

async function kindOf(...parts: (string | number[] | Buffer)[]) {
  const path = join(directory, 'file')
  await writeFile(
    path,
    Buffer.concat(
      parts.map((part) => (typeof part === 'string' ? Buffer.from(part, 'latin1') : Buffer.from(part))),
    ),
  )
  return kindOfFile(path)
}

/** The header of an MPEG-1 layer III frame, 128 kbit/s at 44.1 kHz, and an empty frame behind it. */
const MP3_FRAME = Buffer.concat([Buffer.from([0xff, 0xfb, 0x90, 0x00]), Buffer.alloc(413)])

describe('kindOfFile', () => {
  it('knows audio by its bytes', async () => {
    expect(await kindOf('RIFF', [36, 0, 0, 0], 'WAVEfmt ', Buffer.alloc(20))).toEqual({
      kind: 'audio',
      label: 'WAV',
    })
    expect(await kindOf('RF64', [255, 255, 255, 255], 'WAVEds64', Buffer.alloc(40))).toEqual({
      kind: 'audio',
      label: 'WAV',
    })
    expect(await kindOf('fLaC', Buffer.alloc(60))).toEqual({ kind: 'audio', label: 'FLAC' })
    expect(await kindOf([0, 0, 0, 32], 'ftypM4A ', Buffer.alloc(40))).toEqual({
      kind: 'audio',
      label: 'M4A (MPEG-4 audio)',
    })
    expect(await kindOf([0xff, 0xf1, 0x50, 0x80], Buffer.alloc(400))).toEqual({
      kind: 'audio',
      label: 'AAC (ADTS)',
    })
    expect(await kindOf(MP3_FRAME, MP3_FRAME)).toEqual({ kind: 'audio', label: 'MP3' })
  })

  it('finds MP3 behind a tag longer than what is read, and behind a frame cut in two', async () => {
    // 100,000 bytes of picture: 0, 6, 13, 32 in sevens of bits.
    expect(
      await kindOf('ID3', [4, 0, 0, 0, 6, 13, 32], Buffer.alloc(100_000), MP3_FRAME, MP3_FRAME),
    ).toMatchObject({ label: 'MP3' })
    expect(await kindOf(Buffer.alloc(300, 0x55), MP3_FRAME, MP3_FRAME)).toMatchObject({ label: 'MP3' })
  })

  it('takes neither texts nor pictures nor noise for audio', async () => {
    expect(await kindOf('This is a text that calls itself music.\r\n')).toEqual({ kind: 'text' })
    expect(await kindOf([0xff, 0xfe], Buffer.from('A text in UTF-16', 'utf16le'))).toEqual({ kind: 'text' })
    expect(await kindOf('%PDF-1.7\n')).toEqual({ kind: 'other', mediaType: 'application/pdf' })
    expect(await kindOf(Buffer.alloc(2000))).toEqual({ kind: 'unknown' })
  })
})
