import { describe, expect, it } from 'vitest'
import { isSameSound, powerAt, rmsDb } from '../testing/signals.ts'
import { composeTune } from './compose-tune.ts'
import { SCALES } from './harmony.ts'
import { renderTune } from './render-tune.ts'
import { pitchToHz } from './tune.ts'

const SEEDS = [1, 2, 3, 4, 5, 6, 7, 8]
const RATE_HZ = 11_025

describe('composeTune', () => {
  it('gives the same tune for the same seed and another for another', () => {
    expect(composeTune(7)).toEqual(composeTune(7))
    const melodies = Array.from({ length: 60 }, (_, seed) =>
      composeTune(seed)
        .notes.filter((note) => note.part === 'melody')
        .slice(0, 24)
        .map((note) => `${note.pitch}:${note.durationSeconds.toFixed(2)}`)
        .join(' '),
    )
    expect(new Set(melodies).size).toBe(60)
  })

  it.each(SEEDS)(
    'composes a song from seed %i: form, key, moving melody, two to two and a half minutes',
    (seed) => {
      const tune = composeTune(seed)
      const names = tune.sections.map((section) => section.name)
      expect(names[0]).toBe('intro')
      expect(names[names.length - 1]).toBe('outro')
      expect(names.filter((name) => name === 'chorus').length).toBeGreaterThanOrEqual(1)
      expect(tune.durationSeconds).toBeGreaterThan(105)
      expect(tune.durationSeconds).toBeLessThan(165)
      const melody = tune.notes.filter((note) => note.part === 'melody')
      expect(new Set(melody.map((note) => note.pitch)).size).toBeGreaterThanOrEqual(6)
      const allowed = new Set(SCALES[tune.mode].map((semitones) => (semitones + tune.tonic) % 12))
      const isLifted = tune.sections.some((section) => section.transposition > 0)
      const inKey = tune.notes.filter((note) => allowed.has(note.pitch % 12)).length / tune.notes.length
      expect(inKey).toBeGreaterThan(isLifted ? 0.6 : 0.999)
    },
  )
})

describe('renderTune', () => {
  it.each(SEEDS)('renders seed %i at a sensible level, unclipped, without offset', (seed) => {
    const tune = composeTune(seed)
    const samples = renderTune(tune, RATE_HZ)
    expect(samples.length).toBe(Math.round(tune.durationSeconds * RATE_HZ))
    const peak = samples.reduce((largest, value) => Math.max(largest, Math.abs(value)), 0)
    expect(peak).toBeLessThan(0.93)
    expect(peak).toBeGreaterThan(0.3)
    expect(rmsDb(samples)).toBeGreaterThan(-24)
    expect(rmsDb(samples)).toBeLessThan(-12)
    expect(Math.abs(samples.reduce((sum, value) => sum + value, 0) / samples.length)).toBeLessThan(1e-4)
  })

  it('gives the same samples every time', () => {
    const [first, second, other] = [3, 3, 4].map((seed) => renderTune(composeTune(seed), RATE_HZ))
    expect(first && second && isSameSound(first, second)).toBe(true)
    expect(first && other && isSameSound(first, other)).toBe(false)
  })

  it.each(SEEDS)('sounds the melody notes of seed %i at their frequencies', (seed) => {
    const tune = composeTune(seed)
    const samples = renderTune(tune, RATE_HZ)
    const long = tune.notes
      .filter((note) => note.part === 'melody' && note.durationSeconds > 0.35)
      .slice(0, 60)
    const heard = long.filter((note) => {
      const start = Math.round((note.startSeconds + 0.02) * RATE_HZ)
      const sound = samples.subarray(start, start + Math.round(0.32 * RATE_HZ))
      const frequencyHz = pitchToHz(note.pitch, tune.tuningHz)
      // A semitone to either side, which the scale mostly leaves empty.
      const beside = [-1, 1].map((step) => powerAt(sound, frequencyHz * 2 ** (step / 12), RATE_HZ))
      return powerAt(sound, frequencyHz, RATE_HZ) > Math.max(...beside)
    })
    expect(long.length).toBeGreaterThan(10)
    expect(heard.length / long.length).toBeGreaterThan(0.85)
  })

  it.each(SEEDS)('is no drone: the spectrum of seed %i keeps changing', (seed) => {
    const tune = composeTune(seed)
    const samples = renderTune(tune, RATE_HZ)
    const pitches = Array.from({ length: 36 }, (_, i) => pitchToHz(48 + i, tune.tuningHz))
    const loudestAt = (second: number) => {
      const sound = samples.subarray(second * RATE_HZ, second * RATE_HZ + 3000)
      const powers = pitches.map((frequencyHz) => powerAt(sound, frequencyHz, RATE_HZ))
      return powers.indexOf(Math.max(...powers))
    }
    const loudest = Array.from({ length: 60 }, (_, i) => loudestAt(20 + i))
    const changes = loudest.filter((pitch, i) => i > 0 && pitch !== loudest[i - 1]).length
    expect(changes).toBeGreaterThan(20)
  })
})
