export type { SpeedVariant } from './block-landmarks.ts'
export {
  createIndex,
  type CatalogueIndex,
  type PlacedRecording,
  type PlacedSegment,
} from './catalogue-index.ts'
export {
  defaultThresholds,
  type Detection,
  type DetectionThresholds,
  type EvidencePair,
} from './detection.ts'
export { createLandmarkExtractor, type LandmarkExtractor, type Landmarks } from './extractor.ts'
export {
  decodeFingerprint,
  encodeFingerprint,
  FingerprintFormatError,
  isCurrentFingerprint,
  type Fingerprint,
} from './fingerprint-codec.ts'
export {
  buildIndexSegment,
  segmentFromBuffers,
  segmentToBuffers,
  type IndexEntry,
  type IndexSegment,
  type SegmentBuffers,
} from './index-segment.ts'
export {
  createLogAnalyser,
  type AnalysisTimings,
  type LogAnalyser,
  type LogAnalyserOptions,
} from './log-analyser.ts'
export { ENGINE_VERSION, engineParameters } from './parameters.ts'
