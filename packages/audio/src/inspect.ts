import { absurdHeader, emptyFile, undecodable, unrecognisedFormat, AudioError } from './audio-error.ts'
import { AUDIO_FORMATS, type AudioFormat } from './formats/audio-format.ts'
import type { ByteSource } from './formats/bytes.ts'
import { parseFlacStreamInfo } from './formats/flac.ts'
import {
  countChainedFrames,
  findFirstFrame,
  id3v2Bytes,
  parseAdtsFrame,
  parseMpegFrame,
  taggedSampleCount,
  type FrameHeader,
} from './formats/mpeg-audio.ts'
import { summariseOgg } from './formats/ogg.ts'
import { assertPlausible, readWaveLayout, type WaveLayout } from './formats/riff.ts'
import { SNIFF_BYTES, sniffAudio } from './formats/sniff.ts'
import { runProgram } from './processes.ts'

/** What the headers of a recording say, before anything is decoded. */
export type Inspection = {
  readonly format: AudioFormat
  readonly channels: number
  readonly sampleRateHz: number
  readonly durationSeconds: number
  /** True when the header counts samples; false when the length was estimated from the bit rate. */
  readonly isDurationExact: boolean
  /** Where the first frame or the container begins: behind tags and garbage. */
  readonly startOffset: number
  readonly wave: WaveLayout | null
  /** The container itself shows that its end is missing. */
  readonly isCutOff: boolean
}

const SEARCH_BLOCK_BYTES = 256 * 1024
const SEARCH_LIMIT_BYTES = 4 * 1024 * 1024

async function skipId3(source: ByteSource): Promise<number> {
  let start = 0
  for (;;) {
    const length = id3v2Bytes(await source.readAt(start, 10), 0)
    if (length === 0) return start
    start += length
    if (start > source.sizeBytes) throw undecodable('ID3 tag longer than the file')
  }
}

/** Tells the format of an open file, looking behind tags and garbage. */
async function sniffSource(source: ByteSource): Promise<{ format: AudioFormat; startOffset: number }> {
  if (source.sizeBytes === 0) throw emptyFile()
  const start = await skipId3(source)
  const format = sniffAudio(await source.readAt(start, SNIFF_BYTES))
  if (format && format.id !== 'mp3' && format.id !== 'mp2' && format.id !== 'aac') {
    return { format, startOffset: start }
  }
  // Frames may begin behind garbage that is longer than the sniffed head.
  const limit = Math.min(source.sizeBytes, start + SEARCH_LIMIT_BYTES)
  for (let position = start; position < limit; position += SEARCH_BLOCK_BYTES / 2) {
    const found = findFirstFrame(await source.readAt(position, SEARCH_BLOCK_BYTES), 0)
    if (found) return { format: AUDIO_FORMATS[found.frame.codec], startOffset: position + found.offset }
  }
  // A tag of a music file without any music behind it is audio with nothing in it, not an unknown format.
  if (start > 0 && start >= source.sizeBytes - 128) throw undecodable('nothing behind the ID3 tag')
  throw unrecognisedFormat()
}

const FRAME_SAMPLE_POINTS = 24
const FRAME_SAMPLE_BYTES = 32 * 1024

/** Average frame size from chains read at points spread over the file: exact for constant, close for variable rates. */
async function estimateFrameCount(source: ByteSource, startOffset: number, frame: FrameHeader) {
  const parse = frame.codec === 'aac' ? parseAdtsFrame : parseMpegFrame
  const span = source.sizeBytes - startOffset
  let bytes = 0
  let frames = 0
  for (let point = 0; point < FRAME_SAMPLE_POINTS; point++) {
    const block = await source.readAt(
      startOffset + Math.floor((span * point) / FRAME_SAMPLE_POINTS),
      FRAME_SAMPLE_BYTES,
    )
    const found = findFirstFrame(block, 0)
    if (!found) continue
    const chain = countChainedFrames(block, found.offset, parse, Infinity)
    bytes += chain.endOffset - found.offset
    frames += chain.frames
    if (span <= FRAME_SAMPLE_BYTES) break
  }
  return frames === 0 ? 0 : Math.round((span * frames) / bytes)
}

async function inspectFrames(source: ByteSource, format: AudioFormat, startOffset: number) {
  const head = await source.readAt(startOffset, SNIFF_BYTES)
  const frame = (format.id === 'aac' ? parseAdtsFrame : parseMpegFrame)(head, 0)
  if (!frame) throw undecodable('first frame')
  const tagged = taggedSampleCount(head, 0, frame)
  const samples = tagged ?? (await estimateFrameCount(source, startOffset, frame)) * frame.samplesPerFrame
  return {
    channels: frame.channels,
    sampleRateHz: frame.sampleRateHz,
    durationSeconds: samples / frame.sampleRateHz,
    isDurationExact: tagged !== null,
  }
}

async function inspectWave(source: ByteSource) {
  const wave = await readWaveLayout(source)
  const { format } = wave
  const isPcm = wave.format.formatTag === 1 || wave.format.formatTag === 3
  if (isPcm && format.blockBytes !== (format.channels * format.bitsPerSample) / 8) {
    throw absurdHeader(
      `${format.blockBytes} bytes per block for ${format.channels} × ${format.bitsPerSample} bit`,
    )
  }
  const durationSeconds = isPcm
    ? Math.floor(wave.dataBytes / format.blockBytes) / format.sampleRateHz
    : wave.dataBytes / Math.max(1, format.bytesPerSecond)
  return {
    channels: format.channels,
    sampleRateHz: format.sampleRateHz,
    durationSeconds,
    isDurationExact: isPcm,
    wave,
    isCutOff: wave.declaredDataBytes !== null && wave.declaredDataBytes > wave.dataBytes,
  }
}

const PROBE_ARGUMENTS = [
  '-v',
  'error',
  '-protocol_whitelist',
  'file',
  '-f',
  'mov',
  '-of',
  'json',
  '-select_streams',
  'a:0',
]
const PROBE_ENTRIES = 'stream=codec_name,channels,sample_rate,duration:format=duration'

function field(value: unknown, name: string): unknown {
  return typeof value === 'object' && value !== null ? Reflect.get(value, name) : undefined
}

/** Asks ffprobe; for containers we do not read ourselves. */
async function inspectWithFfprobe(path: string) {
  const run = await runProgram('ffprobe', [
    ...PROBE_ARGUMENTS,
    '-show_entries',
    PROBE_ENTRIES,
    '-i',
    `file:${path}`,
  ])
  if (run.code !== 0) {
    if (run.stderr.includes('moov atom not found')) {
      throw new AudioError(
        'undecodable',
        'This M4A recording was cut off before the recorder finished writing it, so it cannot be played. Please export or copy it again.',
        run.stderr,
      )
    }
    throw undecodable(run.stderr)
  }
  const answer: unknown = JSON.parse(run.stdout.toString('utf8'))
  const streams = field(answer, 'streams')
  const stream: unknown = Array.isArray(streams) ? streams[0] : undefined
  if (stream === undefined) {
    throw new AudioError(
      'no-audio-stream',
      'The file holds no sound, only pictures or data. Please send the audio recording.',
    )
  }
  const durationSeconds = Number(field(stream, 'duration') ?? field(field(answer, 'format'), 'duration'))
  return {
    channels: Number(field(stream, 'channels')),
    sampleRateHz: Number(field(stream, 'sample_rate')),
    durationSeconds: Number.isFinite(durationSeconds) ? durationSeconds : 0,
    // The table of samples counts them all.
    isDurationExact: durationSeconds > 0,
  }
}

async function inspectFlac(source: ByteSource, start: number) {
  const info = parseFlacStreamInfo(await source.readAt(start, 64))
  if (!info) throw undecodable('STREAMINFO')
  const { channels, sampleRateHz, totalSamples } = info
  return {
    channels,
    sampleRateHz,
    durationSeconds: totalSamples / Math.max(1, sampleRateHz),
    isDurationExact: totalSamples > 0,
  }
}

async function inspectOgg(source: ByteSource, start: number) {
  const summary = await summariseOgg(source, start)
  if (!summary) throw undecodable('first Ogg page')
  return {
    channels: summary.stream.channels,
    sampleRateHz: summary.stream.sampleRateHz,
    durationSeconds: summary.durationSeconds,
    isDurationExact: true,
    isCutOff: !summary.isComplete,
  }
}

async function inspectByFormat(path: string, source: ByteSource, format: AudioFormat, startOffset: number) {
  switch (format.id) {
    case 'mp3':
    case 'mp2':
    case 'aac':
      return inspectFrames(source, format, startOffset)
    case 'wav':
      return inspectWave(source)
    case 'flac':
      return inspectFlac(source, startOffset)
    case 'ogg-vorbis':
    case 'ogg-opus':
    case 'ogg-flac':
      return inspectOgg(source, startOffset)
    case 'm4a':
      return inspectWithFfprobe(path)
  }
}

/**
 * Reads the headers of a recording.
 * @throws AudioError when the file is not usable audio.
 */
export async function inspectAudio(path: string, source: ByteSource): Promise<Inspection> {
  const { format, startOffset } = await sniffSource(source)
  const found = await inspectByFormat(path, source, format, startOffset)
  assertPlausible(found.channels, found.sampleRateHz)
  return { wave: null, isCutOff: false, ...found, format, startOffset }
}
