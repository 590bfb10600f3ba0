import type { SegmentBuffers } from '@fieldfare/fingerprint'

/** A change of the reference catalogue, in order; every thread applies each once. */
export type IndexChange =
  { kind: 'add'; segment: SegmentBuffers } | { kind: 'remove'; recordingNumber: number }

/** What is asked of a thread. `changes` are those it has not applied yet. */
export type ThreadRequest =
  | { task: 'fingerprint'; path: string }
  | { task: 'build-segment'; entries: readonly { recordingNumber: number; landmarks: Uint8Array }[] }
  | { task: 'analyse'; path: string; changes: readonly IndexChange[] }

export type FingerprintOutcome = {
  landmarks: Uint8Array
  landmarkHashes: number
  durationSeconds: number
  format: string
  isSilent: boolean
}

export type FoundDetection = {
  recordingNumber: number
  startSeconds: number
  endSeconds: number
  referenceStartSeconds: number
  speedRatio: number
  confidence: number
  expectedFalseAlarms: number
  decision: 'accept' | 'review'
  agreeingHashes: number
  evidence: readonly { logSeconds: number; referenceSeconds: number }[]
}

export type HeardSpan = { kind: 'music' | 'speech' | 'silence'; startSeconds: number; endSeconds: number }

export type AnalysisOutcome = {
  detections: FoundDetection[]
  spans: HeardSpan[]
  durationSeconds: number
  format: string
  isTruncated: boolean
  isSilent: boolean
  catalogueRecordings: number
  /** Time spent decoding, and spent on everything after it. */
  decodeMs: number
  analyseMs: number
}

export type ThreadResults = {
  fingerprint: FingerprintOutcome
  'build-segment': SegmentBuffers
  analyse: AnalysisOutcome
}

/** What a thread sends back: any number of `progress`, then one `done` or `failed`. */
export type ThreadMessage =
  | { kind: 'progress'; doneSeconds: number }
  | { kind: 'done'; result: ThreadResults[keyof ThreadResults] }
  | { kind: 'failed'; audioError: { code: string; userMessage: string } | null; message: string }
