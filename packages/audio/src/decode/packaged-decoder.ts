import decode, { type StreamDecoder } from 'audio-decode'
import type { ByteSource } from '../formats/bytes.ts'
import { viewOf } from '../formats/bytes.ts'
import type { WaveFormat } from '../formats/riff.ts'
import type { Inspection } from '../inspect.ts'
import { downmix } from './downmix.ts'
import type { PcmBlock } from './pcm-source.ts'

const LARGEST_READ_BYTES = 64 * 1024
const SMALLEST_READ_BYTES = 1024
/** A few kilobytes of digital silence can hold hours of sound; reads shrink so that one step stays below this. */
const TARGET_BLOCK_SECONDS = 8

/** A plain header for the bare samples of any WAV, RF64 or BW64 file, whatever chunks stand around them. */
function plainWaveHeader(format: WaveFormat): Uint8Array {
  const header = new Uint8Array(44)
  const text = (offset: number, value: string) => header.set(new TextEncoder().encode(value), offset)
  const view = viewOf(header)
  text(0, 'RIFF')
  view.setUint32(4, 0xffff_ffff, true)
  text(8, 'WAVEfmt ')
  view.setUint32(16, 16, true)
  view.setUint16(20, format.formatTag, true)
  view.setUint16(22, format.channels, true)
  view.setUint32(24, format.sampleRateHz, true)
  view.setUint32(28, format.bytesPerSecond, true)
  view.setUint16(32, format.blockBytes, true)
  view.setUint16(34, format.bitsPerSample, true)
  text(36, 'data')
  view.setUint32(40, 0xffff_ffff, true)
  return header
}

type DecoderPlan = {
  create: () => Promise<StreamDecoder>
  startOffset: number
  endOffset: number
  header: Uint8Array | null
}

const PCM_BITS = [8, 16, 24, 32]

function planWave({ wave }: Inspection): DecoderPlan | null {
  if (!wave) return null
  const { format, dataOffset, dataBytes } = wave
  const isSupported =
    (format.formatTag === 1 && PCM_BITS.includes(format.bitsPerSample)) ||
    (format.formatTag === 3 && (format.bitsPerSample === 32 || format.bitsPerSample === 64))
  if (!isSupported) return null
  const endOffset = dataOffset + dataBytes
  return { create: decode.wav, startOffset: dataOffset, endOffset, header: plainWaveHeader(format) }
}

function planDecoder(source: ByteSource, inspection: Inspection): DecoderPlan | null {
  const whole = { startOffset: inspection.startOffset, endOffset: source.sizeBytes, header: null }
  switch (inspection.format.id) {
    case 'mp3':
      return { create: decode.mp3, ...whole }
    case 'flac':
      return { create: decode.flac, ...whole }
    case 'ogg-vorbis':
      return { create: decode.oga, ...whole }
    case 'ogg-opus':
      return { create: decode.opus, ...whole }
    case 'wav':
      return planWave(inspection)
    case 'mp2':
    case 'ogg-flac':
    case 'm4a':
    case 'aac':
      return null
  }
}

/** Whether audio-decode can stream this recording; the rest goes through ffmpeg. */
export function canStreamWithPackage(source: ByteSource, inspection: Inspection): boolean {
  return planDecoder(source, inspection) !== null
}

/** Streams a recording through audio-decode with bounded memory. Rejects with whatever the decoder throws. */
export async function* decodeWithPackage(
  source: ByteSource,
  inspection: Inspection,
): AsyncGenerator<PcmBlock, void, undefined> {
  const plan = planDecoder(source, inspection)
  if (!plan) throw new Error(`audio-decode cannot stream ${inspection.format.id}`)
  const decoder = await plan.create()
  try {
    if (plan.header) await decoder(plan.header)
    let readBytes = 4096
    for (let position = plan.startOffset; position < plan.endOffset;) {
      const bytes = await source.readAt(position, Math.min(readBytes, plan.endOffset - position))
      if (bytes.length === 0) break
      position += bytes.length
      const { channelData, sampleRate } = await decoder(bytes)
      const seconds = sampleRate > 0 ? (channelData[0]?.length ?? 0) / sampleRate : 0
      readBytes = nextReadBytes(readBytes, seconds)
      if (seconds > 0) yield { samples: downmix(channelData), sampleRateHz: sampleRate }
    }
    const rest = await decoder()
    if (rest.sampleRate > 0) yield { samples: downmix(rest.channelData), sampleRateHz: rest.sampleRate }
  } finally {
    decoder.free()
  }
}

function nextReadBytes(readBytes: number, seconds: number): number {
  if (seconds > TARGET_BLOCK_SECONDS) {
    const fitting = Math.floor((readBytes * TARGET_BLOCK_SECONDS) / seconds)
    return Math.max(SMALLEST_READ_BYTES, fitting)
  }
  return Math.min(LARGEST_READ_BYTES, seconds < TARGET_BLOCK_SECONDS / 2 ? readBytes * 2 : readBytes)
}
