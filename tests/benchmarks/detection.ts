/**
 * Measures how well recordings are found in logs, on real music of Debian packages, and prints each figure beside its
 * target. Every third piece is left out of the catalogue and serves as music nobody knows.
 * Arguments name conditions to run (a part of the name is enough); without any, all run.
 */
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { CatalogueIndex } from '@fieldfare/fingerprint'
import { createRandom, createSpeech, decodeSamples, writeMp3 } from '../corpus/index.ts'
import { detectIn, fingerprintOf, indexOf, loadMusic, toEngineRate } from './catalogue.ts'
import { listConditions, type Condition } from './conditions.ts'
import { printReport, type ConditionResult } from './report.ts'
import { scoreLog } from './scoring.ts'

const SEED = 20_26
const RATE_HZ = 8000

async function measure(
  { name, build, bitRate }: Condition,
  index: CatalogueIndex,
  numberOf: (track: string) => number,
  folder: string,
): Promise<ConditionResult> {
  const { samples, seconds, plays } = await build()
  const path = join(folder, 'log.mp3')
  if (bitRate) await writeMp3(samples, path, { bitRate })
  const heard = bitRate ? await decodeSamples(path, RATE_HZ) : await toEngineRate(samples)
  const started = performance.now()
  const score = scoreLog(plays, detectIn(heard, index), numberOf)
  const times = Math.round((seconds * 1000) / (performance.now() - started))
  const wrong = score.falseAccepted + score.falseReview
  console.error(`${name}: ${score.found} of ${score.plays} plays, ${wrong} wrong, ${times} × real time`)
  return { name, seconds, score }
}

const music = await loadMusic()
const catalogue = music.filter((_, n) => n % 3 !== 2)
const unknown = music.filter((_, n) => n % 3 === 2)
const fingerprints = []
for (const { samples } of catalogue) fingerprints.push(fingerprintOf(await toEngineRate(samples)))
const index = indexOf(fingerprints)
const random = createRandom(SEED)
console.log(`seed ${SEED}; ${catalogue.length} recordings in the catalogue, ${unknown.length} outside`)

const wanted = process.argv.slice(2)
const conditions = listConditions({ catalogue, unknown, speech: await createSpeech(random), random })
const numberOf = (path: string): number => catalogue.findIndex(({ track }) => track.path === path)
const folder = await mkdtemp(join(tmpdir(), 'bench-'))
const results: ConditionResult[] = []
try {
  for (const condition of conditions) {
    if (wanted.length > 0 && !wanted.some((part) => condition.name.includes(part))) continue
    results.push(await measure(condition, index, numberOf, folder))
  }
} finally {
  await rm(folder, { recursive: true, force: true })
}
printReport(results)
