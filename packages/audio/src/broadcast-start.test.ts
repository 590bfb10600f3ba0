import { writeFile } from 'node:fs/promises'
import { describe, expect, it } from 'vitest'
import { readBroadcastStart } from './broadcast-start.ts'
import { waveHeader } from './encode/wave-header.ts'
import { viewOf } from './formats/bytes.ts'
import { useTemporaryFolder } from './testing/temporary-folder.ts'

const file = useTemporaryFolder()

type Extension = { date: string; time: string; reference: bigint; version: number; description?: string }

/** A `bext` chunk by the byte layout of EBU Tech 3285 version 2 (May 2011): 602 bytes and the coding history. */
function extensionChunk({ date, time, reference, version, description = 'Log' }: Extension): Uint8Array {
  const history = 'A=PCM,F=48000,W=16,M=mono\r\n'
  const chunk = new Uint8Array(8 + 602 + history.length + (history.length % 2))
  const view = viewOf(chunk)
  const text = (offset: number, value: string) => chunk.set(new TextEncoder().encode(value), 8 + offset)
  chunk.set(new TextEncoder().encode('bext'))
  view.setUint32(4, 602 + history.length, true)
  text(0, description)
  text(256, 'Studio 2')
  text(320, date)
  text(330, time)
  view.setUint32(8 + 338, Number(reference & 0xffff_ffffn), true)
  view.setUint32(8 + 342, Number(reference >> 32n), true)
  view.setUint16(8 + 346, version, true)
  text(602, history)
  return chunk
}

async function write(name: string, extension: Extension, rateHz: number, isLast = false): Promise<string> {
  const plain = waveHeader(rateHz, 96)
  const head = plain.subarray(0, 36)
  const data = Buffer.concat([plain.subarray(36), new Uint8Array(96)])
  const chunk = extensionChunk(extension)
  await writeFile(file(name), Buffer.concat(isLast ? [head, data, chunk] : [head, chunk, data]))
  return file(name)
}

describe('readBroadcastStart', () => {
  it.each([
    // Sample counts computed as hours × 3,600 × rate.
    ['10:00:00', 48_000, 1_728_000_000n, '2026-03-09T10:00:00.000'],
    ['23:59:59', 44_100, 3_810_195_900n, '2026-03-09T23:59:59.000'],
    ['00:00:00', 48_000, 4_147_200_000n, '2026-03-10T00:00:00.000'],
    ['13:00:00', 96_000, 4_492_800_000n, '2026-03-09T13:00:00.000'],
    ['10:00:00', 48_000, 1_728_024_000n, '2026-03-09T10:00:00.500'],
  ])('reads %s at %i Hz from the sample count', async (time, rateHz, reference, expected) => {
    const path = await write('start.wav', { date: '2026-03-09', time, reference, version: 2 }, rateHz)
    expect(await readBroadcastStart(path)).toMatchObject({
      localDateTime: expected,
      samplesSinceMidnight: Number(reference),
      sampleRateHz: rateHz,
      source: 'time-reference',
      originator: 'Studio 2',
    })
  })

  it('falls back to the time of origination, in any version and with any separator', async () => {
    for (const [version, separator] of [
      [0, ':'],
      [1, '_'],
      [2, '.'],
    ] as const) {
      const date = ['2025', '12', '31'].join(separator)
      const path = await write('time.wav', { date, time: '06:30:15', reference: 0n, version }, 48_000, true)
      expect(await readBroadcastStart(path)).toMatchObject({
        localDateTime: '2025-12-31T06:30:15.000',
        samplesSinceMidnight: 23_415 * 48_000,
        source: 'origination-time',
      })
    }
  })

  it('takes midnight itself from the count of zero', async () => {
    const path = await write(
      'midnight.wav',
      { date: '2026-01-01', time: '00:00:00', reference: 0n, version: 1 },
      8000,
    )
    expect(await readBroadcastStart(path)).toMatchObject({ localDateTime: '2026-01-01T00:00:00.000' })
  })

  it('reads a description that fills its field without an end mark', async () => {
    const description = 'd'.repeat(256)
    const extension = { date: '2026-01-01', time: '01:00:00', reference: 0n, version: 1, description }
    expect((await readBroadcastStart(await write('full.wav', extension, 8000)))?.description).toBe(
      description,
    )
  })

  it.each(['2026-02-30', '0000-00-00', '', 'yesterday!'])(
    'knows nothing when the date is "%s"',
    async (date) => {
      const path = await write('bad.wav', { date, time: '01:00:00', reference: 5n, version: 1 }, 8000)
      expect(await readBroadcastStart(path)).toBeNull()
    },
  )

  it('knows nothing of a plain WAV and of what is no WAV', async () => {
    await writeFile(file('plain.wav'), Buffer.concat([waveHeader(8000, 96), new Uint8Array(96)]))
    await writeFile(file('text.wav'), 'not audio')
    expect(await readBroadcastStart(file('plain.wav'))).toBeNull()
    expect(await readBroadcastStart(file('text.wav'))).toBeNull()
  })
})
