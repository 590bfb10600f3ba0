import { readdir } from 'node:fs/promises'
import { extname, join } from 'node:path'
import { AudioError, decodeMono } from '@fieldfare/audio'
import {
  buildIndexSegment,
  createIndex,
  createLandmarkExtractor,
  createLogAnalyser,
  ENGINE_VERSION,
  engineParameters,
  type CatalogueIndex,
  type Detection,
  type Fingerprint,
} from '@fieldfare/fingerprint'
import type { CatalogueRow } from './catalogue-file.ts'
import { ScanInputError } from './scan-input-error.ts'

/** One detection as it is written. Times in seconds from the start of the log. */
export type ScanDetection = {
  readonly log: string
  readonly isrc: string
  readonly start: number
  readonly end: number
  readonly refStart: number
  readonly speed: number
  readonly confidence: number
  readonly expectedFalseAlarms: number
  readonly decision: Detection['decision']
}

export type ScanStats = {
  readonly log: string
  readonly seconds: number
  readonly decodeMs: number
  readonly analyseMs: number
  readonly matchMs: number
  readonly peakRssMb: number
}

export type ScanReport = {
  readonly detections: readonly ScanDetection[]
  readonly stats: readonly ScanStats[]
  readonly index: {
    readonly recordings: number
    readonly hashes: number
    readonly bytes: number
    readonly buildMs: number
  }
}

type Progress = (line: string) => void

const AUDIO_EXTENSIONS = new Set(['.mp3', '.wav', '.flac', '.ogg', '.oga', '.opus', '.m4a', '.mp4', '.aac'])

/** Decodes a file block by block; returns the milliseconds spent waiting for the decoder. */
async function decodeInto(path: string, onBlock: (samples: Float32Array) => void): Promise<number> {
  let waitedMs = 0
  let asked = performance.now()
  try {
    for await (const samples of decodeMono(path, { sampleRateHz: engineParameters.sampleRateHz })) {
      waitedMs += performance.now() - asked
      onBlock(samples)
      asked = performance.now()
    }
  } catch (error) {
    if (error instanceof AudioError) throw new ScanInputError(`${path}: ${error.userMessage}`)
    throw error
  }
  return waitedMs + performance.now() - asked
}

async function fingerprintOf(path: string): Promise<Fingerprint> {
  const extractor = createLandmarkExtractor()
  await decodeInto(path, extractor.push)
  extractor.finish()
  const durationSeconds = extractor.sampleCount() / engineParameters.sampleRateHz
  return { engineVersion: ENGINE_VERSION, durationSeconds, ...extractor.drain() }
}

async function buildIndex(rows: readonly CatalogueRow[], progress: Progress): Promise<CatalogueIndex> {
  const entries = []
  for (const [recordingNumber, { path, file }] of rows.entries()) {
    entries.push({ recordingNumber, fingerprint: await fingerprintOf(path) })
    progress(`reference ${recordingNumber + 1}/${rows.length} ${file}`)
  }
  const index = createIndex()
  index.addSegment(buildIndexSegment(entries))
  return index
}

async function listLogs(folder: string): Promise<string[]> {
  const names = await readdir(folder).catch(() => {
    throw new ScanInputError(`${folder}: no such folder of logs`)
  })
  const logs = names.filter((name) => AUDIO_EXTENSIONS.has(extname(name).toLowerCase())).sort()
  if (logs.length === 0) throw new ScanInputError(`${folder}: holds no audio files`)
  return logs
}

function rounded(value: number, digits: number): number {
  return Number(value.toFixed(digits))
}

function written(log: string, rows: readonly CatalogueRow[], detection: Detection): ScanDetection {
  return {
    log,
    isrc: rows[detection.recordingNumber]?.isrc ?? '',
    start: rounded(detection.startSeconds, 3),
    end: rounded(detection.endSeconds, 3),
    refStart: rounded(detection.referenceStartSeconds, 3),
    speed: rounded(detection.speedRatio, 5),
    confidence: rounded(detection.confidence, 2),
    expectedFalseAlarms: detection.expectedFalseAlarms,
    decision: detection.decision,
  }
}

async function scanLog(path: string, log: string, index: CatalogueIndex) {
  const analyser = createLogAnalyser({ index, now: () => performance.now() })
  const detections: Detection[] = []
  let samplesRead = 0
  let peakRss = 0
  const decodeMs = await decodeInto(path, (samples) => {
    samplesRead += samples.length
    detections.push(...analyser.push(samples))
    peakRss = Math.max(peakRss, process.memoryUsage.rss())
  })
  detections.push(...analyser.finish())
  const { analyseMs, matchMs } = analyser.timings()
  const stats: ScanStats = {
    log,
    seconds: rounded(samplesRead / engineParameters.sampleRateHz, 3),
    decodeMs: Math.round(decodeMs),
    analyseMs: Math.round(analyseMs),
    matchMs: Math.round(matchMs),
    peakRssMb: Math.round(peakRss / 1e6),
  }
  detections.sort((a, b) => a.startSeconds - b.startSeconds || a.recordingNumber - b.recordingNumber)
  return { detections, stats }
}

/** Finds the recordings of a catalogue in every log of a folder. @throws ScanInputError for input that cannot be used. */
export async function scanLogs(
  rows: readonly CatalogueRow[],
  logFolder: string,
  progress: Progress,
): Promise<ScanReport> {
  const logs = await listLogs(logFolder)
  const started = performance.now()
  const index = await buildIndex(rows, progress)
  const buildMs = Math.round(performance.now() - started)
  const detections: ScanDetection[] = []
  const stats: ScanStats[] = []
  for (const [n, log] of logs.entries()) {
    const result = await scanLog(join(logFolder, log), log, index)
    detections.push(...result.detections.map((detection) => written(log, rows, detection)))
    stats.push(result.stats)
    progress(`log ${n + 1}/${logs.length} ${log}: ${result.detections.length} detections`)
  }
  return {
    detections,
    stats,
    index: { recordings: index.recordingCount, hashes: index.hashCount, bytes: index.byteLength, buildMs },
  }
}
