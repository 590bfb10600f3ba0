/**
 * Measures what a log costs: decoding alone against the whole pipeline, the index per minute of reference, the time to
 * load it, and memory. The first argument is the length of the log in minutes (60), the second the number of
 * recordings in the catalogue (300): beyond the real ones they are made from shuffled landmarks of real music.
 */
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { decodeMono } from '@fieldfare/audio'
import {
  createIndex,
  createLogAnalyser,
  decodeFingerprint,
  encodeFingerprint,
  engineParameters,
  segmentFromBuffers,
  segmentToBuffers,
  buildIndexSegment,
  type Fingerprint,
} from '@fieldfare/fingerprint'
import { airBroadcast, createRandom, levelled, runProgram, writeMp3, type Random } from '../corpus/index.ts'
import { fingerprintOf, loadMusic, toEngineRate } from './catalogue.ts'

const RATE_HZ = engineParameters.sampleRateHz
const minutes = Number(process.argv[2] ?? 60)
const recordings = Number(process.argv[3] ?? 300)

/** Another recording with landmarks as common as in real music: the hashes of one, dealt out anew. */
function reshuffled({ hashes, ...rest }: Fingerprint, random: Random): Fingerprint {
  const dealt = hashes.slice()
  for (let i = dealt.length - 1; i > 0; i--) {
    const other = Math.floor(random() * (i + 1))
    const kept = dealt[i] ?? 0
    dealt[i] = dealt[other] ?? 0
    dealt[other] = kept
  }
  return { ...rest, hashes: dealt }
}

async function timed<Result>(work: () => Promise<Result> | Result): Promise<{ ms: number; result: Result }> {
  const started = performance.now()
  const result = await work()
  return { ms: performance.now() - started, result }
}

const music = await loadMusic(['wesnoth-1.16-music', 'singularity-music'])
const real: Fingerprint[] = []
for (const { samples } of music) real.push(fingerprintOf(await toEngineRate(samples)))
const random = createRandom(1)
const stored: Uint8Array[] = []
for (let n = 0; n < recordings; n++) {
  const source = real[n % real.length]
  if (source) stored.push(encodeFingerprint(n < real.length ? source : reshuffled(source, random)))
}

const load = await timed(() => {
  const entries = stored.map((bytes, recordingNumber) => ({
    recordingNumber,
    fingerprint: decodeFingerprint(bytes),
  }))
  const referenceMinutes = entries.reduce((sum, { fingerprint }) => sum + fingerprint.durationSeconds / 60, 0)
  return { segment: buildIndexSegment(entries), referenceMinutes }
})
const index = createIndex()
index.addSegment(segmentFromBuffers(segmentToBuffers(load.result.segment)))
const { referenceMinutes } = load.result

const items = []
for (let seconds = 0, n = 0; seconds < minutes * 60; n++) {
  const samples = levelled(music[n % music.length]?.samples ?? new Float32Array(1))
  items.push({ samples })
  seconds += samples.length / 22_050
}
const folder = await mkdtemp(join(tmpdir(), 'speed-'))
try {
  const path = join(folder, 'log.mp3')
  await writeMp3(airBroadcast(items).samples.subarray(0, minutes * 60 * 22_050), path)
  items.length = 0
  const raw = ['-f', 'f32le', '-ac', '1', '-ar', String(RATE_HZ)]
  const alone = await timed(() =>
    runProgram('ffmpeg', ['-v', 'error', '-y', '-i', path, ...raw, '/dev/null']),
  )
  const before = process.memoryUsage.rss()
  let peak = before
  const analyser = createLogAnalyser({ index, now: () => performance.now() })
  const whole = await timed(async () => {
    let found = 0
    for await (const samples of decodeMono(path, { sampleRateHz: RATE_HZ })) {
      found += analyser.push(samples).length
      peak = Math.max(peak, process.memoryUsage.rss())
    }
    return found + analyser.finish().length
  })
  const { analyseMs, matchMs } = analyser.timings()
  const times = (ms: number): string => `${Math.round((minutes * 60_000) / ms)} × real time`
  console.log(
    `log of ${minutes} min, ${index.recordingCount} recordings, ${index.hashCount} landmarks, ${whole.result} detections`,
  )
  console.log(`ffmpeg decoding alone        ${Math.round(alone.ms)} ms (${times(alone.ms)})`)
  console.log(
    `whole pipeline               ${Math.round(whole.ms)} ms (${times(whole.ms)}): ${(whole.ms / alone.ms).toFixed(2)} × decoding; target ≤ 1.5`,
  )
  console.log(`  spectra and peaks          ${Math.round(analyseMs)} ms (${times(analyseMs)})`)
  console.log(`  matching                   ${Math.round(matchMs)} ms (${times(matchMs)})`)
  console.log(
    `index                        ${(index.byteLength / referenceMinutes / 1000).toFixed(1)} kB per reference minute; target ≤ 30`,
  )
  console.log(
    `stored fingerprint           ${(stored.reduce((sum, { length }) => sum + length, 0) / referenceMinutes / 1000).toFixed(1)} kB per reference minute`,
  )
  console.log(
    `index loaded                 ${Math.round(load.ms)} ms for ${recordings} recordings; target ≤ 10 s for 10,000`,
  )
  console.log(`memory while analysing       ${Math.round((peak - before) / 1e6)} MB more; target ≤ 600`)
} finally {
  await rm(folder, { recursive: true, force: true })
}
