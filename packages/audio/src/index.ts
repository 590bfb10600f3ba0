export { AudioError, type AudioErrorCode } from './audio-error.ts'
export {
  decodeMono,
  SILENCE_PEAK,
  type DecodedAudio,
  type DecodeOptions,
  type DecodeSummary,
} from './decode/decode-mono.ts'
export {
  AUDIO_FORMATS,
  extensionMatchesFormat,
  type AudioFormat,
  type AudioFormatId,
} from './formats/audio-format.ts'
export { SNIFF_BYTES, sniffAudio } from './formats/sniff.ts'
export { probeAudio, type AudioProbe } from './probe.ts'
export { createResampler, resample, type Resampler } from './resample/resampler.ts'
