export { AudioError, type AudioErrorCode } from './audio-error.ts'
export { readBroadcastStart, type BroadcastStart } from './broadcast-start.ts'
export {
  createAirtimeClassifier,
  type AirtimeClassifier,
  type AirtimeKind,
  type AirtimeSpan,
} from './classify/airtime-classifier.ts'
export { cutClip, LONGEST_CLIP_SECONDS, type ClipOptions, type ClipRange } from './cut-clip.ts'
export {
  decodeMono,
  SILENCE_PEAK,
  type DecodedAudio,
  type DecodeOptions,
  type DecodeSummary,
} from './decode/decode-mono.ts'
export {
  renderDemoLog,
  type DemoLogItem,
  type DemoLogPlan,
  type DemoLogPlay,
  type DemoLogTruth,
  type DemoSamples,
} from './demo-log/render-demo-log.ts'
export {
  openAudioWriter,
  writeAudioFile,
  type AudioWriter,
  type EncodingFormat,
  type EncodingOptions,
} from './encode/audio-writer.ts'
export {
  AUDIO_FORMATS,
  extensionMatchesFormat,
  type AudioFormat,
  type AudioFormatId,
} from './formats/audio-format.ts'
export { SNIFF_BYTES, sniffAudio } from './formats/sniff.ts'
export { probeAudio, type AudioProbe } from './probe.ts'
export { createResampler, resample, type Resampler } from './resample/resampler.ts'
export { composeTune } from './synthesis/compose-tune.ts'
export { renderSpeech, type Voice } from './synthesis/render-speech.ts'
export { renderTune } from './synthesis/render-tune.ts'
export { pitchToHz, type Mode, type Note, type Part, type Section, type Tune } from './synthesis/tune.ts'
