import { execFile } from 'node:child_process'
import { mkdir, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { z } from 'zod'

const reportSchema = z.object({
  detections: z.array(
    z.object({
      log: z.string(),
      isrc: z.string(),
      start: z.number(),
      end: z.number(),
      refStart: z.number(),
      speed: z.number(),
      confidence: z.number(),
      expectedFalseAlarms: z.number(),
      decision: z.enum(['accept', 'review']),
    }),
  ),
  stats: z.array(
    z.object({
      log: z.string(),
      seconds: z.number(),
      decodeMs: z.number(),
      analyseMs: z.number(),
      matchMs: z.number(),
      peakRssMb: z.number(),
    }),
  ),
  index: z.object({ recordings: z.number(), hashes: z.number(), bytes: z.number(), buildMs: z.number() }),
})

const RATE_HZ = 8000

/** Notes of changing pitch and length from a seeded generator; no two seeds sound alike. */
function tune(seed: number, seconds: number): Float32Array {
  const samples = new Float32Array(seconds * RATE_HZ)
  let state = seed
  const random = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 2 ** 32
  }
  for (let start = 0; start < samples.length; start += Math.round((0.08 + 0.15 * random()) * RATE_HZ)) {
    const hertz = 200 * 2 ** (3.5 * random())
    for (let i = start; i < Math.min(samples.length, start + RATE_HZ / 2); i++) {
      const t = (i - start) / RATE_HZ
      samples[i] = (samples[i] ?? 0) + 0.15 * Math.exp(-6 * t) * Math.sin(2 * Math.PI * hertz * t)
    }
  }
  return samples
}

function wave(samples: Float32Array): Uint8Array {
  const bytes = new DataView(new ArrayBuffer(44 + samples.length * 2))
  const text = (at: number, value: string): void => {
    for (let i = 0; i < value.length; i++) bytes.setUint8(at + i, value.charCodeAt(i))
  }
  text(0, 'RIFF')
  bytes.setUint32(4, 36 + samples.length * 2, true)
  text(8, 'WAVEfmt ')
  bytes.setUint32(16, 16, true)
  bytes.setUint16(20, 1, true)
  bytes.setUint16(22, 1, true)
  bytes.setUint32(24, RATE_HZ, true)
  bytes.setUint32(28, RATE_HZ * 2, true)
  bytes.setUint16(32, 2, true)
  bytes.setUint16(34, 16, true)
  text(36, 'data')
  bytes.setUint32(40, samples.length * 2, true)
  samples.forEach((sample, i) => {
    bytes.setInt16(44 + i * 2, Math.round(Math.max(-1, Math.min(1, sample)) * 32767), true)
  })
  return new Uint8Array(bytes.buffer)
}

type Outcome = { code: number; stdout: string; stderr: string }

function scan(...args: string[]): Promise<Outcome> {
  const tsx = join(import.meta.dirname, '../../../../node_modules/.bin/tsx')
  return new Promise((resolve) => {
    execFile(tsx, [join(import.meta.dirname, 'main.ts'), ...args], (error, stdout, stderr) => {
      resolve({ code: error ? Number(error.code) : 0, stdout, stderr })
    })
  })
}

describe('the scan command', () => {
  let folder = ''
  const inFolder = (...parts: string[]): string => join(folder, ...parts)

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'scan-'))
    for (const name of ['catalogue', 'logs', 'quiet', 'empty', 'broken']) await mkdir(inFolder(name))
    await writeFile(inFolder('catalogue', 'one.wav'), wave(tune(1, 40)))
    await writeFile(inFolder('catalogue', 'two.wav'), wave(tune(2, 40)))
    await writeFile(
      inFolder('catalogue.csv'),
      'file,isrc,title,artist\none.wav,XXTST2600001,First,Someone\ntwo.wav,XXTST2600002,Second,"Else, Someone"\n',
    )
    const log = new Float32Array(70 * RATE_HZ)
    log.set(tune(3, 10))
    log.set(tune(2, 40).subarray(10 * RATE_HZ, 35 * RATE_HZ), 20 * RATE_HZ)
    await writeFile(inFolder('logs', 'morning.wav'), wave(log))
    await writeFile(inFolder('quiet', 'night.wav'), wave(tune(4, 20)))
    await writeFile(inFolder('broken', 'noise.mp3'), 'this is not audio')
  })
  afterAll(() => rm(folder, { recursive: true, force: true }))

  it('writes where each recording was played, in seconds of the log', async () => {
    const out = inFolder('detections.json')
    const outcome = await scan(
      '--catalogue',
      inFolder('catalogue.csv'),
      '--logs',
      inFolder('logs'),
      '--out',
      out,
    )
    expect(outcome).toMatchObject({ code: 0, stdout: '' })
    expect(outcome.stderr).toContain('morning.wav')
    const report = reportSchema.parse(JSON.parse(await readFile(out, 'utf8')))
    expect(report.detections).toHaveLength(1)
    const [found] = report.detections
    expect(found).toMatchObject({ log: 'morning.wav', isrc: 'XXTST2600002', decision: 'accept' })
    expect(Math.abs((found?.start ?? 0) - 20)).toBeLessThan(1)
    expect(Math.abs((found?.end ?? 0) - 45)).toBeLessThan(1)
    expect(Math.abs((found?.refStart ?? 0) - 10)).toBeLessThan(1)
    expect(found?.speed).toBeCloseTo(1, 2)
    expect(report.stats[0]).toMatchObject({ log: 'morning.wav', seconds: 70 })
    expect(report.index.recordings).toBe(2)
  }, 60_000)

  it('ends well when nothing was found', async () => {
    const out = inFolder('nothing.json')
    const outcome = await scan(
      '--catalogue',
      inFolder('catalogue.csv'),
      '--logs',
      inFolder('quiet'),
      '--out',
      out,
    )
    expect(outcome.code).toBe(0)
    expect(reportSchema.parse(JSON.parse(await readFile(out, 'utf8'))).detections).toEqual([])
  }, 60_000)

  it.each([
    ['no arguments', [], /^usage: /],
    [
      'a missing catalogue',
      ['--catalogue', 'absent.csv', '--logs', 'logs', '--out', 'x.json'],
      /absent\.csv/,
    ],
    [
      'a missing log folder',
      ['--catalogue', 'catalogue.csv', '--logs', 'absent', '--out', 'x.json'],
      /absent/,
    ],
    [
      'a folder without audio',
      ['--catalogue', 'catalogue.csv', '--logs', 'empty', '--out', 'x.json'],
      /empty/,
    ],
    [
      'a file that is no audio',
      ['--catalogue', 'catalogue.csv', '--logs', 'broken', '--out', 'x.json'],
      /noise\.mp3/,
    ],
    ['an unknown option', ['--loud', 'yes'], /loud/],
  ])(
    'ends with 2 and one line for %s',
    async (_name, args, message) => {
      const placed = args.map((arg, i) => (i % 2 === 1 && arg !== 'yes' ? inFolder(arg) : arg))
      const outcome = await scan(...placed)
      expect(outcome.code).toBe(2)
      const lines = outcome.stderr
        .trim()
        .split('\n')
        .filter((line) => !line.startsWith('reference '))
      expect(lines).toHaveLength(1)
      expect(lines[0]).toMatch(message)
    },
    60_000,
  )
})
