import { bendPeak } from './bend-peak.ts'
import { createRandom } from './random.ts'
import { renderDrum } from './render-drum.ts'
import { renderNote } from './render-note.ts'
import { pitchToHz, type Drum, type Note, type Tune } from './tune.ts'

/** Loudness the finished tune is brought to, RMS below full scale. */
const TARGET_RMS = 10 ** (-18 / 20)
/** Removes what cannot be heard, a constant offset above all. */
const LOW_CUT_HZ = 25
const FINAL_FADE_SECONDS = 0.5

function mixInto(output: Float32Array, sound: Float32Array, start: number, gain: number): void {
  const count = Math.min(sound.length, output.length - start)
  for (let i = 0; i < count; i++) output[start + i] = (output[start + i] ?? 0) + gain * (sound[i] ?? 0)
}

/** Plays all notes. Equal notes sound alike, so each is made once and laid in wherever it is played. */
function mixNotes(tune: Tune, sampleRateHz: number, output: Float32Array): void {
  const sounds = new Map<string, Float32Array>()
  const soundOf = ({ part, pitch, durationSeconds }: Note) => {
    const key = `${part} ${pitch} ${durationSeconds.toFixed(3)}`
    let sound = sounds.get(key)
    if (!sound) {
      const frequencyHz = pitchToHz(pitch, tune.tuningHz)
      sound = renderNote(tune.instruments[part], frequencyHz, durationSeconds, sampleRateHz)
      sounds.set(key, sound)
    }
    return sound
  }
  for (const note of tune.notes) {
    const start = Math.round(note.startSeconds * sampleRateHz)
    mixInto(output, soundOf(note), start, tune.levels[note.part] * note.velocity)
  }
}

function mixDrums(tune: Tune, sampleRateHz: number, output: Float32Array): void {
  const kit = createRandom(tune.seed).branch('kit')
  const sounds = new Map<Drum, Float32Array>()
  for (const { drum, startSeconds, velocity } of tune.drumHits) {
    let sound = sounds.get(drum)
    if (!sound) {
      sound = renderDrum(kit.branch(drum), drum, sampleRateHz)
      sounds.set(drum, sound)
    }
    mixInto(output, sound, Math.round(startSeconds * sampleRateHz), tune.levels.drums * velocity)
  }
}

function addEcho({ echo }: Tune, sampleRateHz: number, samples: Float32Array): void {
  const delay = Math.max(1, Math.round(echo.delaySeconds * sampleRateHz))
  for (let i = delay; i < samples.length; i++) {
    samples[i] = (samples[i] ?? 0) + echo.level * (samples[i - delay] ?? 0)
  }
}

function cutLowEnd(sampleRateHz: number, samples: Float32Array): void {
  const keep = Math.exp((-2 * Math.PI * LOW_CUT_HZ) / sampleRateHz)
  let previousInput = 0
  let previousOutput = 0
  for (let i = 0; i < samples.length; i++) {
    const input = samples[i] ?? 0
    previousOutput = keep * (previousOutput + input - previousInput)
    previousInput = input
    samples[i] = previousOutput
  }
}

/** Brings the tune to its loudness and bends the peaks that would leave the range. */
function level(sampleRateHz: number, samples: Float32Array): void {
  let sum = 0
  for (let i = 0; i < samples.length; i++) sum += (samples[i] ?? 0) ** 2
  const rms = Math.sqrt(sum / Math.max(1, samples.length))
  const gain = rms > 0 ? TARGET_RMS / rms : 0
  const fade = Math.round(FINAL_FADE_SECONDS * sampleRateHz)
  for (let i = 0; i < samples.length; i++) {
    samples[i] = bendPeak(gain * (samples[i] ?? 0)) * Math.min(1, (samples.length - i) / fade)
  }
}

/**
 * Renders a tune to mono samples within ±0.92, at about −18 dBFS RMS. The same tune and rate always give the same
 * samples.
 * @throws RangeError when the rate is below 8,000 Hz or not whole.
 */
export function renderTune(tune: Tune, sampleRateHz: number): Float32Array {
  if (!Number.isInteger(sampleRateHz) || sampleRateHz < 8000) throw new RangeError('sampleRateHz')
  const samples = new Float32Array(Math.round(tune.durationSeconds * sampleRateHz))
  mixNotes(tune, sampleRateHz, samples)
  mixDrums(tune, sampleRateHz, samples)
  addEcho(tune, sampleRateHz, samples)
  cutLowEnd(sampleRateHz, samples)
  level(sampleRateHz, samples)
  return samples
}
