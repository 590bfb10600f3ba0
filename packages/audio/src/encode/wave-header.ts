import { viewOf } from '../formats/bytes.ts'

export const WAVE_HEADER_BYTES = 44
const BYTES_PER_SAMPLE = 2

/** The header of a mono 16-bit WAV file (RIFF, format tag 1) with this many bytes of samples behind it. */
export function waveHeader(sampleRateHz: number, dataBytes: number): Uint8Array {
  const header = new Uint8Array(WAVE_HEADER_BYTES)
  const view = viewOf(header)
  const text = (offset: number, value: string) => header.set(new TextEncoder().encode(value), offset)
  text(0, 'RIFF')
  view.setUint32(4, WAVE_HEADER_BYTES - 8 + dataBytes, true)
  text(8, 'WAVEfmt ')
  view.setUint32(16, 16, true)
  view.setUint16(20, 1, true)
  view.setUint16(22, 1, true)
  view.setUint32(24, sampleRateHz, true)
  view.setUint32(28, sampleRateHz * BYTES_PER_SAMPLE, true)
  view.setUint16(32, BYTES_PER_SAMPLE, true)
  view.setUint16(34, 8 * BYTES_PER_SAMPLE, true)
  text(36, 'data')
  view.setUint32(40, dataBytes, true)
  return header
}

/** Rounds samples to 16 bits, little-endian; what lies outside ±1 is held at full scale. */
export function toPcm16(samples: Float32Array): Uint8Array {
  const bytes = new Uint8Array(samples.length * BYTES_PER_SAMPLE)
  const view = viewOf(bytes)
  for (let i = 0; i < samples.length; i++) {
    const scaled = Math.round((samples[i] ?? 0) * 32_767)
    view.setInt16(i * BYTES_PER_SAMPLE, Math.max(-32_768, Math.min(32_767, scaled)), true)
  }
  return bytes
}

/** Reads a plain mono 16-bit WAV held in memory whose sizes may not be filled in, as programs write to a pipe. */
export function fromPcm16Wave(bytes: Uint8Array): { samples: Float32Array; sampleRateHz: number } {
  const view = viewOf(bytes)
  if (bytes.length < WAVE_HEADER_BYTES) return { samples: new Float32Array(0), sampleRateHz: 22_050 }
  const count = Math.floor((bytes.length - WAVE_HEADER_BYTES) / BYTES_PER_SAMPLE)
  const samples = new Float32Array(count)
  for (let i = 0; i < count; i++) {
    samples[i] = view.getInt16(WAVE_HEADER_BYTES + i * BYTES_PER_SAMPLE, true) / 32_768
  }
  return { samples, sampleRateHz: view.getUint32(24, true) }
}
