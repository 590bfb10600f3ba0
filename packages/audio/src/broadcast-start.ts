import { openByteSource, viewOf } from './formats/bytes.ts'
import { readWaveLayout } from './formats/riff.ts'
import { SNIFF_BYTES, sniffAudio } from './formats/sniff.ts'

/** When a recorder says a recording began, from its Broadcast Wave header (EBU Tech 3285). */
export type BroadcastStart = {
  /** Local wall-clock time of the first sample, `yyyy-mm-ddThh:mm:ss.sss`; the header knows no time zone. */
  readonly localDateTime: string
  readonly samplesSinceMidnight: number
  readonly sampleRateHz: number
  /** Where the time of day was found. A recorder that leaves the sample count at zero only gives whole seconds. */
  readonly source: 'time-reference' | 'origination-time'
  readonly originator: string
  readonly description: string
}

const SMALLEST_EXTENSION_BYTES = 348
const DAY_MS = 24 * 3600 * 1000

function readText(bytes: Uint8Array, offset: number, length: number): string {
  const field = bytes.subarray(offset, offset + length)
  const end = field.indexOf(0)
  return new TextDecoder().decode(end >= 0 ? field.subarray(0, end) : field).trim()
}

/** Separators are hyphen, underscore, colon, space or full stop, by the standard's own list. */
const DATE = /^(\d{4})[-_: .](\d{2})[-_: .](\d{2})$/
const TIME = /^(\d{2})[-_: .](\d{2})[-_: .](\d{2})$/

function midnightOf(text: string): number | null {
  const [, year, month, day] = DATE.exec(text) ?? []
  if (year === undefined || month === undefined || day === undefined) return null
  const instant = Date.UTC(Number(year), Number(month) - 1, Number(day))
  const isReal = new Date(instant).toISOString().startsWith(`${year}-${month}-${day}`)
  return isReal && Number(year) > 0 ? instant : null
}

function secondsOf(text: string): number {
  const [, hours, minutes, seconds] = TIME.exec(text) ?? []
  const total = Number(hours) * 3600 + Number(minutes) * 60 + Number(seconds)
  return Number.isFinite(total) && total < 24 * 3600 ? total : 0
}

function interpret(bytes: Uint8Array, sampleRateHz: number): BroadcastStart | null {
  if (bytes.length < SMALLEST_EXTENSION_BYTES) return null
  const midnight = midnightOf(readText(bytes, 320, 10))
  if (midnight === null) return null
  const view = viewOf(bytes)
  const counted = view.getUint32(342, true) * 2 ** 32 + view.getUint32(338, true)
  const originationSeconds = secondsOf(readText(bytes, 330, 8))
  const isCounted = counted > 0 || originationSeconds === 0
  const samplesSinceMidnight = isCounted ? counted : originationSeconds * sampleRateHz
  const milliseconds = Math.round((samplesSinceMidnight / sampleRateHz) * 1000)
  // A count of more than two days is no time of day but a counter that was never reset.
  if (milliseconds > 2 * DAY_MS) return null
  return {
    localDateTime: new Date(midnight + milliseconds).toISOString().slice(0, 23),
    samplesSinceMidnight,
    sampleRateHz,
    source: isCounted ? 'time-reference' : 'origination-time',
    originator: readText(bytes, 256, 32),
    description: readText(bytes, 0, 256),
  }
}

/**
 * Reads when a Broadcast Wave recording began. Null when the file is not WAV, RF64 or BW64, has no `bext` chunk, or
 * the chunk holds no usable date.
 * @throws AudioError when the file cannot be opened or its WAV structure is damaged.
 */
export async function readBroadcastStart(path: string): Promise<BroadcastStart | null> {
  const source = await openByteSource(path)
  try {
    if (sniffAudio(await source.readAt(0, SNIFF_BYTES))?.id !== 'wav') return null
    const { broadcastExtension, format } = await readWaveLayout(source)
    if (!broadcastExtension) return null
    const bytes = Math.min(broadcastExtension.bytes, SMALLEST_EXTENSION_BYTES)
    return interpret(await source.readAt(broadcastExtension.offset, bytes), format.sampleRateHz)
  } finally {
    await source.close()
  }
}
