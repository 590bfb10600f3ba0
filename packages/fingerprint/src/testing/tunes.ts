import { ENGINE_VERSION, engineParameters } from '../parameters.ts'
import { createLandmarkExtractor } from '../extractor.ts'
import type { Fingerprint } from '../fingerprint-codec.ts'

const { sampleRateHz } = engineParameters

/** A seeded source of numbers in [0, 1). */
export function seeded(seed: number): () => number {
  let state = (seed * 2654435761) >>> 0
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 2 ** 32
  }
}

/** Notes of random pitch and length with three partials each; no two seeds sound alike. */
export function tune(seed: number, seconds: number): Float32Array {
  const samples = new Float32Array(Math.round(seconds * sampleRateHz))
  const random = seeded(seed)
  for (let start = 0; start < samples.length; start += Math.round((0.08 + 0.15 * random()) * sampleRateHz)) {
    const hertz = 150 * 2 ** (3 * random())
    const end = Math.min(samples.length, start + sampleRateHz / 2)
    for (let i = start; i < end; i++) {
      const t = (i - start) / sampleRateHz
      for (let partial = 1; partial <= 3; partial++) {
        samples[i] += (0.15 / partial) * Math.exp(-6 * t) * Math.sin(2 * Math.PI * hertz * partial * t)
      }
    }
  }
  return samples
}

/** Something like a voice: a gliding harmonic tone in syllables. */
export function voice(seed: number, seconds: number): Float32Array {
  const samples = new Float32Array(Math.round(seconds * sampleRateHz))
  const random = seeded(seed)
  let phase = 0
  for (let start = 0; start < samples.length; start += Math.round((0.12 + 0.2 * random()) * sampleRateHz)) {
    const hertz = 100 + 60 * random()
    const glide = 40 * (random() - 0.5)
    const length = Math.round((0.1 + 0.1 * random()) * sampleRateHz)
    for (let i = start; i < Math.min(samples.length, start + length); i++) {
      const share = (i - start) / length
      phase += (2 * Math.PI * (hertz + glide * share)) / sampleRateHz
      const loudness = 0.2 * Math.sin(Math.PI * share)
      for (let partial = 1; partial <= 12; partial++)
        samples[i] += (loudness / partial) * Math.sin(partial * phase)
    }
  }
  return samples
}

/** Places sounds in silence, each at a second. */
export function placed(seconds: number, sounds: readonly (readonly [number, Float32Array])[]): Float32Array {
  const samples = new Float32Array(Math.round(seconds * sampleRateHz))
  for (const [at, sound] of sounds) {
    const first = Math.round(at * sampleRateHz)
    for (let i = 0; i < sound.length && first + i < samples.length; i++) samples[first + i] += sound[i]
  }
  return samples
}

/** The stretch of a sound between two seconds. */
export function cut(sound: Float32Array, fromSeconds: number, toSeconds: number): Float32Array {
  return sound.slice(Math.round(fromSeconds * sampleRateHz), Math.round(toSeconds * sampleRateHz))
}

export function fingerprintOf(samples: Float32Array): Fingerprint {
  const extractor = createLandmarkExtractor()
  extractor.push(samples)
  extractor.finish()
  const durationSeconds = samples.length / sampleRateHz
  return { engineVersion: ENGINE_VERSION, durationSeconds, ...extractor.drain() }
}
