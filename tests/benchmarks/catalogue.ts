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
import {
  decodeSamples,
  fetchDebianMusic,
  runProgram,
  type MusicTrack,
  type Samples,
} from '../corpus/index.ts'
import { CORPUS_RATE_HZ } from '../corpus/index.ts'

/** Real music free to fetch; each package by other composers. */
export const MUSIC_PACKAGES = [
  'wesnoth-1.16-music',
  'singularity-music',
  'drascula-music',
  'colobot-common-sounds',
  'xmoto-data',
  'zaz-data',
  'hyperrogue-music',
] as const

const SHORTEST_SECONDS = 60
/** In drascula-music, track30 is track1 again under another name: neither is wrong where the other is played. */
const REPEATED_PIECES = new Set(['track30'])
const RATE_HZ = engineParameters.sampleRateHz

export type LoadedTrack = { readonly track: MusicTrack; readonly samples: Samples }

/** Decodes the pieces long enough to be music; a file ffmpeg cannot read is named and left out. */
export async function loadMusic(packages: readonly string[] = MUSIC_PACKAGES): Promise<LoadedTrack[]> {
  const loaded: LoadedTrack[] = []
  for (const packageName of packages) {
    for (const track of await fetchDebianMusic(packageName)) {
      if (REPEATED_PIECES.has(track.name)) continue
      try {
        const samples = await decodeSamples(track.path)
        if (samples.length >= SHORTEST_SECONDS * CORPUS_RATE_HZ) loaded.push({ track, samples })
      } catch (error) {
        console.error(`left out ${track.path}: ${error instanceof Error ? error.message : String(error)}`)
      }
    }
  }
  return loaded
}

/** What a decoder of the product gives the engine: samples at its own rate. */
export async function toEngineRate(samples: Samples): Promise<Samples> {
  const input = new Uint8Array(samples.buffer, samples.byteOffset, samples.byteLength)
  const raw = ['-f', 'f32le', '-ac', '1', '-ar']
  const bytes = await runProgram(
    'ffmpeg',
    ['-v', 'error', ...raw, String(CORPUS_RATE_HZ), '-i', '-', ...raw, String(RATE_HZ), '-'],
    { input },
  )
  return new Float32Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length))
}

export function fingerprintOf(samples: Samples): Fingerprint {
  const extractor = createLandmarkExtractor()
  extractor.push(samples)
  extractor.finish()
  return { engineVersion: ENGINE_VERSION, durationSeconds: samples.length / RATE_HZ, ...extractor.drain() }
}

export function indexOf(fingerprints: readonly Fingerprint[]): CatalogueIndex {
  const index = createIndex()
  index.addSegment(
    buildIndexSegment(fingerprints.map((fingerprint, recordingNumber) => ({ recordingNumber, fingerprint }))),
  )
  return index
}

const BLOCK_SAMPLES = 65_536

/** Runs the engine over samples at its own rate. */
export function detectIn(samples: Samples, index: CatalogueIndex): Detection[] {
  const analyser = createLogAnalyser({ index })
  const detections: Detection[] = []
  for (let at = 0; at < samples.length; at += BLOCK_SAMPLES) {
    detections.push(...analyser.push(samples.subarray(at, at + BLOCK_SAMPLES)))
  }
  return [...detections, ...analyser.finish()]
}
