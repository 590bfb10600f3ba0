import { describe, expect, it } from 'vitest'
import { engineParameters } from './parameters.ts'
import { createPeakPicker } from './peaks.ts'
import { createSpectrumAnalyser } from './spectrum.ts'
import { tune } from './testing/tunes.ts'

type Found = { frame: number; bin: number; rank: number }

function peaksOf(samples: Float32Array): Found[] {
  const found: Found[] = []
  const picker = createPeakPicker((frame, bin, rank) => void found.push({ frame, bin, rank }))
  const spectrum = createSpectrumAnalyser(engineParameters.frameSamples, engineParameters.hopSamples)
  spectrum.push(samples, picker.push)
  spectrum.finish(picker.push)
  picker.finish()
  return found
}

describe('peak picker', () => {
  it('places a burst of a tone between frames and bins', () => {
    const hertz = 1003
    const centre = 1.3
    const samples = Float32Array.from({ length: 20_000 }, (_, n) => {
      const t = n / engineParameters.sampleRateHz
      return 0.5 * Math.exp(-(((t - centre) / 0.05) ** 2)) * Math.sin(2 * Math.PI * hertz * t)
    })
    const [peak] = peaksOf(samples).filter(({ rank }) => rank === 0)
    expect(peak.bin).toBeCloseTo((hertz * engineParameters.frameSamples) / engineParameters.sampleRateHz, 0)
    expect(peak.frame * (engineParameters.hopSamples / engineParameters.sampleRateHz)).toBeCloseTo(centre, 1)
  })

  it('finds nothing in silence', () => {
    expect(peaksOf(new Float32Array(16_000))).toEqual([])
  })

  it('finds the same peaks whatever the volume', () => {
    const samples = tune(1, 5)
    const quiet = samples.map((sample) => sample * 0.25)
    const places = (found: Found[]): string[] =>
      found.map(({ frame, bin, rank }) => `${Math.round(frame)} ${Math.round(bin)} ${rank}`)
    const loud = places(peaksOf(samples).filter(({ rank }) => rank === 0))
    const soft = new Set(places(peaksOf(quiet)))
    expect(loud.length).toBeGreaterThan(30)
    expect(loud.filter((place) => soft.has(place)).length / loud.length).toBeGreaterThan(0.98)
  })

  it('never gives two dominant peaks within one neighbourhood, and gives peaks in order', () => {
    const found = peaksOf(tune(2, 10))
    const dominant = found.filter(({ rank }) => rank === 0)
    for (const [i, a] of dominant.entries()) {
      for (const b of dominant.slice(i + 1)) {
        const isNear = Math.abs(a.frame - b.frame) < 7 && Math.abs(a.bin - b.bin) < 17
        expect(isNear).toBe(false)
      }
    }
    const rows = found.map(({ frame }) => Math.round(frame))
    expect(rows).toEqual([...rows].sort((a, b) => a - b))
  })
})
