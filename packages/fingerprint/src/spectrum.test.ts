import { describe, expect, it } from 'vitest'
import { createSpectrumAnalyser } from './spectrum.ts'
import { seeded } from './testing/tunes.ts'

const SIZE = 64
const HOP = 16

/** The definition, term by term. */
function directPower(frame: readonly number[], bin: number): number {
  let real = 0
  let imaginary = 0
  frame.forEach((sample, n) => {
    const weight = 0.5 - 0.5 * Math.cos((2 * Math.PI * n) / SIZE)
    real += weight * sample * Math.cos((2 * Math.PI * bin * n) / SIZE)
    imaginary -= weight * sample * Math.sin((2 * Math.PI * bin * n) / SIZE)
  })
  return real * real + imaginary * imaginary
}

function rowsOf(samples: Float32Array): number[][] {
  const rows: number[][] = []
  const analyser = createSpectrumAnalyser(SIZE, HOP)
  const keep = (power: Float32Array): void => void rows.push([...power])
  analyser.push(samples, keep)
  analyser.finish(keep)
  return rows
}

describe('spectrum analyser', () => {
  it('gives the powers of the discrete Fourier transform of each Hann-weighted frame', () => {
    const random = seeded(1)
    const samples = Float32Array.from({ length: 200 }, () => random() - 0.5)
    const rows = rowsOf(samples)
    expect(rows).toHaveLength(Math.floor(200 / HOP) + 1)
    rows.forEach((row, n) => {
      const frame = Array.from({ length: SIZE }, (_, i) => samples[n * HOP + i - SIZE / 2] ?? 0)
      row.forEach((power, bin) => {
        expect(power).toBeCloseTo(directPower(frame, bin), 3)
      })
    })
  })

  it('puts a sine of amplitude 1 at its bin with a power of (size / 4)²', () => {
    const samples = Float32Array.from({ length: 400 }, (_, n) => Math.sin((2 * Math.PI * 8 * n) / SIZE))
    const row = rowsOf(samples)[10]
    expect(row[8]).toBeCloseTo((SIZE / 4) ** 2, 1)
    expect(row.indexOf(Math.max(...row))).toBe(8)
  })
})
