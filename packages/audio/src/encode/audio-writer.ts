import { open, rm } from 'node:fs/promises'
import { decoderMissing, encodingFailed } from '../audio-error.ts'
import { startProgram, writeToChild } from '../processes.ts'
import { toPcm16, waveHeader, WAVE_HEADER_BYTES } from './wave-header.ts'

/** Kinds of file that can be written. */
export type EncodingFormat = 'wav' | 'mp3' | 'flac' | 'ogg' | 'opus' | 'm4a'

export type EncodingOptions = {
  readonly format: EncodingFormat
  /** Bits a second, for the formats that lose something; each has a sensible default. */
  readonly bitRate?: number
  readonly signal?: AbortSignal
}

/** Takes mono samples, a block at a time, into a file. */
export type AudioWriter = {
  /** Waits while the encoder is busy, so that memory stays bounded. */
  write: (samples: Float32Array) => Promise<void>
  /** Completes the file. Until then it is not usable. */
  finish: () => Promise<void>
  /** Gives up: ends the encoder and removes the file. */
  discard: () => Promise<void>
}

const LARGEST_WAVE_BYTES = 0xffff_ffff - WAVE_HEADER_BYTES

/** Makes every run give the same bytes: no dates, versions or random stream numbers. */
const REPEATABLE = ['-map_metadata', '-1', '-fflags', '+bitexact', '-flags:a', '+bitexact']
const ENCODERS: { readonly [Format in Exclude<EncodingFormat, 'wav'>]: readonly string[] } = {
  mp3: ['-c:a', 'libmp3lame', '-f', 'mp3'],
  flac: ['-c:a', 'flac', '-f', 'flac'],
  ogg: ['-c:a', 'libvorbis', '-f', 'ogg'],
  opus: ['-c:a', 'libopus', '-f', 'ogg'],
  m4a: ['-c:a', 'aac', '-movflags', '+faststart', '-f', 'ipod'],
}

async function openWaveWriter(path: string, sampleRateHz: number): Promise<AudioWriter> {
  const file = await open(path, 'w').catch((cause: unknown) => {
    throw encodingFailed(String(cause), { cause })
  })
  let dataBytes = 0
  await file.write(waveHeader(sampleRateHz, 0), 0, WAVE_HEADER_BYTES, 0)
  return {
    async write(samples) {
      const bytes = toPcm16(samples)
      if (dataBytes + bytes.length > LARGEST_WAVE_BYTES) throw encodingFailed('WAV files end at 4 GiB')
      await file.write(bytes, 0, bytes.length, WAVE_HEADER_BYTES + dataBytes)
      dataBytes += bytes.length
    },
    async finish() {
      await file.write(waveHeader(sampleRateHz, dataBytes), 0, WAVE_HEADER_BYTES, 0)
      await file.close()
    },
    async discard() {
      await file.close()
      await rm(path, { force: true })
    },
  }
}

function openFfmpegWriter(
  path: string,
  sampleRateHz: number,
  format: Exclude<EncodingFormat, 'wav'>,
  { bitRate, signal }: EncodingOptions,
): AudioWriter {
  const input = ['-f', 's16le', '-ar', `${sampleRateHz}`, '-ac', '1', '-i', 'pipe:0']
  const rate = bitRate === undefined || format === 'flac' ? [] : ['-b:a', `${bitRate}`]
  const { child, ended } = startProgram(
    'ffmpeg',
    ['-y', '-v', 'error', ...input, ...REPEATABLE, ...rate, ...ENCODERS[format], `file:${path}`],
    signal,
  )
  child.stdout.resume()
  const failIfEnded = async () => {
    const { code, stderr, missing } = await ended
    signal?.throwIfAborted()
    if (missing) throw decoderMissing('ffmpeg')
    if (code !== 0) throw encodingFailed(stderr)
  }
  return {
    async write(samples) {
      signal?.throwIfAborted()
      if (await writeToChild(child.stdin, toPcm16(samples))) return
      await failIfEnded()
      throw encodingFailed('ffmpeg stopped reading')
    },
    async finish() {
      child.stdin.end()
      await failIfEnded()
    },
    async discard() {
      child.kill('SIGKILL')
      await ended
      await rm(path, { force: true })
    },
  }
}

/**
 * Opens a file for mono samples. WAV is written here, 16 bits; everything else by ffmpeg.
 * @throws AudioError `encoding-failed`, or `decoder-missing` (on the first write) when ffmpeg is not installed.
 */
export async function openAudioWriter(
  path: string,
  sampleRateHz: number,
  options: EncodingOptions,
): Promise<AudioWriter> {
  if (!Number.isInteger(sampleRateHz) || sampleRateHz <= 0) throw new RangeError('sampleRateHz')
  options.signal?.throwIfAborted()
  if (options.format === 'wav') return openWaveWriter(path, sampleRateHz)
  return openFfmpegWriter(path, sampleRateHz, options.format, options)
}

const BLOCK_SAMPLES = 65_536

/**
 * Writes samples, or a stream of blocks of them, to an audio file. On failure no file is left behind.
 * @throws AudioError `encoding-failed` or `decoder-missing`.
 */
export async function writeAudioFile(
  path: string,
  samples: Float32Array | AsyncIterable<Float32Array> | Iterable<Float32Array>,
  sampleRateHz: number,
  options: EncodingOptions,
): Promise<void> {
  const writer = await openAudioWriter(path, sampleRateHz, options)
  try {
    if (samples instanceof Float32Array) {
      for (let start = 0; start < samples.length; start += BLOCK_SAMPLES) {
        await writer.write(samples.subarray(start, start + BLOCK_SAMPLES))
      }
    } else {
      for await (const block of samples) await writer.write(block)
    }
    await writer.finish()
  } catch (error) {
    await writer.discard()
    throw error
  }
}
