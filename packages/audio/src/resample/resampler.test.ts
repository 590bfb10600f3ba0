import { describe, expect, it } from 'vitest'
import { powerAt, rmsDb, sine } from '../testing/signals.ts'
import { createRandom } from '../synthesis/random.ts'
import { createResampler, resample } from './resampler.ts'

const SINE_RMS_DB = 20 * Math.log10(0.5 / Math.SQRT2)

/** Without the ends, where the filter meets silence. */
function middle(samples: Float32Array, edge = 800): Float32Array {
  return samples.subarray(edge, samples.length - edge)
}

describe('resampler', () => {
  it.each([
    [44_100, 8000],
    [48_000, 8000],
    [22_050, 8000],
    [96_000, 8000],
    [8000, 22_050],
    [44_100, 11_025],
    [44_101, 8000],
  ])('turns a sine at %i Hz into the same sine at %i Hz', (fromHz, toHz) => {
    const output = resample(sine(1000, 2, fromHz), fromHz, toHz)
    const wanted = sine(1000, 2, toHz)
    expect(Math.abs(output.length - wanted.length)).toBeLessThanOrEqual(1)
    const error = output.subarray(0, wanted.length - 1).map((value, i) => value - (wanted[i] ?? 0))
    expect(rmsDb(middle(error)) - SINE_RMS_DB).toBeLessThan(-60)
  })

  it.each([4400, 5000, 6500, 7900, 9000, 12_000, 15_000, 21_000])(
    'lets nothing of %i Hz through as an alias at 8,000 Hz',
    (frequencyHz) => {
      for (const fromHz of [44_100, 48_000]) {
        const output = resample(sine(frequencyHz, 1, fromHz), fromHz, 8000)
        expect(rmsDb(middle(output)) - SINE_RMS_DB).toBeLessThan(-60)
      }
    },
  )

  it.each([50, 440, 2000, 3500])('keeps the level of %i Hz within 0.1 dB', (frequencyHz) => {
    const output = resample(sine(frequencyHz, 2, 44_100), 44_100, 8000)
    expect(Math.abs(rmsDb(middle(output)) - SINE_RMS_DB)).toBeLessThan(0.1)
    const part = middle(output).slice(0, 8000)
    expect(powerAt(part, frequencyHz, 8000)).toBeGreaterThan(100 * powerAt(part, frequencyHz + 40, 8000))
  })

  it('gives the same samples however the input is cut into blocks', () => {
    const random = createRandom(5)
    const input = Float32Array.from({ length: 30_000 }, () => random.between(-1, 1))
    const whole = resample(input, 44_100, 8000)
    const resampler = createResampler(44_100, 8000)
    const parts: number[] = []
    for (let start = 0; start < input.length;) {
      const length = random.integer(1, 3000)
      parts.push(...resampler.push(input.subarray(start, start + length)))
      start += length
    }
    parts.push(...resampler.finish())
    expect(Float32Array.from(parts)).toEqual(whole)
  })

  it('refuses rates that are not positive whole numbers', () => {
    expect(() => createResampler(0, 8000)).toThrow(RangeError)
    expect(() => createResampler(44_100, 8000.5)).toThrow(RangeError)
  })
})
