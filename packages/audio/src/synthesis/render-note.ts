import type { AdditiveTimbre, Envelope, FmTimbre, Instrument, PluckedTimbre } from './instruments.ts'
import { createRandom } from './random.ts'

const TABLE_SIZE = 4096
const SINE = Float32Array.from({ length: TABLE_SIZE + 1 }, (_, i) => Math.sin((2 * Math.PI * i) / TABLE_SIZE))

/** Sine of a phase counted in turns. */
function sineOfTurns(turns: number): number {
  const position = (turns - Math.floor(turns)) * TABLE_SIZE
  const index = Math.floor(position)
  const left = SINE[index] ?? 0
  return left + (position - index) * ((SINE[index + 1] ?? 0) - left)
}

/** One period with these harmonics, none above the Nyquist frequency. */
function buildPeriod(harmonics: readonly number[], frequencyHz: number, sampleRateHz: number): Float32Array {
  const period = new Float32Array(TABLE_SIZE + 1)
  let total = 0
  harmonics.forEach((strength, index) => {
    const harmonic = index + 1
    if (strength === 0 || harmonic * frequencyHz > 0.45 * sampleRateHz) return
    total += strength * strength
    for (let i = 0; i < TABLE_SIZE; i++) {
      period[i] = (period[i] ?? 0) + strength * (SINE[(i * harmonic) % TABLE_SIZE] ?? 0)
    }
  })
  const scale = total > 0 ? 1 / Math.sqrt(total) : 0
  for (let i = 0; i < TABLE_SIZE; i++) period[i] = (period[i] ?? 0) * scale
  period[TABLE_SIZE] = period[0] ?? 0
  return period
}

/** Share of the bright and of the settled period, changing over the note; vibrato sets in after the attack. */
function renderAdditive(
  timbre: AdditiveTimbre,
  frequencyHz: number,
  sampleRateHz: number,
  output: Float32Array,
): void {
  const bright = buildPeriod(timbre.harmonics, frequencyHz, sampleRateHz)
  const settledHarmonics = timbre.harmonics.map((strength, index) => strength * timbre.dulling ** index)
  const settled = buildPeriod(settledHarmonics, frequencyHz, sampleRateHz)
  const voices = timbre.detuneCents > 0 ? [-0.5, 0.5] : [0]
  const gain = 1 / Math.sqrt(voices.length)
  const brightDecay = Math.exp(-1 / (timbre.dullingSeconds * sampleRateHz))
  const vibratoStep = timbre.vibratoHz / sampleRateHz
  const vibratoDepth = 2 ** (timbre.vibratoCents / 1200) - 1
  const vibratoRise = 1 / (0.35 * sampleRateHz)
  for (const voice of voices) {
    const step = ((frequencyHz * 2 ** ((voice * timbre.detuneCents) / 1200)) / sampleRateHz) * TABLE_SIZE
    let position = voice > 0 ? TABLE_SIZE / 3 : 0
    let brightness = 1
    for (let i = 0; i < output.length; i++) {
      const index = Math.floor(position)
      const fraction = position - index
      const brightLeft = bright[index] ?? 0
      const settledLeft = settled[index] ?? 0
      const brightValue = brightLeft + fraction * ((bright[index + 1] ?? 0) - brightLeft)
      const settledValue = settledLeft + fraction * ((settled[index + 1] ?? 0) - settledLeft)
      output[i] = (output[i] ?? 0) + gain * (settledValue + brightness * (brightValue - settledValue))
      brightness *= brightDecay
      const bend =
        vibratoDepth === 0 ? 0 : vibratoDepth * Math.min(1, i * vibratoRise) * sineOfTurns(i * vibratoStep)
      position += step * (1 + bend)
      while (position >= TABLE_SIZE) position -= TABLE_SIZE
    }
  }
}

function renderFm(timbre: FmTimbre, frequencyHz: number, sampleRateHz: number, output: Float32Array): void {
  const step = frequencyHz / sampleRateHz
  // Carson's rule: sidebands reach about (index + 1) times the modulating frequency; keep them below Nyquist.
  const widest = (0.45 * sampleRateHz - frequencyHz) / (timbre.modulatorRatio * frequencyHz) - 1
  let index = Math.max(0, Math.min(timbre.index, widest)) / (2 * Math.PI)
  const decay = Math.exp(-1 / (timbre.indexDecaySeconds * sampleRateHz))
  const floor = index * 0.3
  for (let i = 0; i < output.length; i++) {
    const phase = i * step
    output[i] = sineOfTurns(phase + index * sineOfTurns(phase * timbre.modulatorRatio)) * 1.2
    index = floor + (index - floor) * decay
  }
}

function renderPlucked(
  timbre: PluckedTimbre,
  frequencyHz: number,
  sampleRateHz: number,
  output: Float32Array,
): void {
  const period = sampleRateHz / frequencyHz
  const stretch = 0.5 * (1 - timbre.brightness)
  // The damping filter delays by `stretch` of a sample; an all-pass makes up the fraction that is left.
  const length = Math.max(2, Math.floor(period - stretch - 0.3))
  const fraction = period - stretch - length
  const allPass = (1 - fraction) / (1 + fraction)
  const loop = new Float32Array(length)
  const noise = createRandom(Math.round(frequencyHz * 1000))
  const pluckedAt = Math.max(1, Math.round(length * timbre.position))
  const burst = Float32Array.from({ length }, () => noise.between(-1, 1))
  let mean = 0
  for (let i = 0; i < length; i++) {
    // Plucking at a point takes away the harmonics that have a node there.
    loop[i] = (burst[i] ?? 0) - (burst[(i + length - pluckedAt) % length] ?? 0)
    mean += (loop[i] ?? 0) / length
  }
  for (let i = 0; i < length; i++) loop[i] = ((loop[i] ?? 0) - mean) * 1.1
  const loss = 0.001 ** (1 / (timbre.ringSeconds * frequencyHz))
  let previous = 0
  let previousInput = 0
  let previousOutput = 0
  for (let i = 0, at = 0; i < output.length; i++) {
    const value = loop[at] ?? 0
    output[i] = value
    const damped = loss * ((1 - stretch) * value + stretch * previous)
    previous = value
    const tuned = allPass * (damped - previousOutput) + previousInput
    previousInput = damped
    previousOutput = tuned
    loop[at] = tuned
    if (++at === length) at = 0
  }
}

/** Shapes a note in place: up, down to the sustained level, held, and away after `heldSeconds`. */
function applyEnvelope(
  samples: Float32Array,
  envelope: Envelope,
  heldSeconds: number,
  sampleRateHz: number,
): void {
  const attack = Math.max(1, Math.round(envelope.attackSeconds * sampleRateHz))
  const held = Math.max(attack, Math.round(heldSeconds * sampleRateHz))
  const decay = Math.exp(-1 / (envelope.decaySeconds * sampleRateHz))
  const release = Math.max(1, samples.length - held)
  let falling = 1 - envelope.sustain
  for (let i = 0; i < samples.length; i++) {
    let level = i < attack ? i / attack : envelope.sustain + falling
    if (i >= attack) falling *= decay
    if (i >= held) {
      const left = 1 - (i - held) / release
      level *= left * left
    }
    samples[i] = (samples[i] ?? 0) * level
  }
}

/**
 * The sound of one note.
 * @param heldSeconds how long it is held; it rings on for the instrument's release
 */
export function renderNote(
  instrument: Instrument,
  frequencyHz: number,
  heldSeconds: number,
  sampleRateHz: number,
): Float32Array {
  const { timbre, envelope } = instrument
  const samples = new Float32Array(Math.ceil((heldSeconds + envelope.releaseSeconds) * sampleRateHz) + 1)
  switch (timbre.kind) {
    case 'additive':
      renderAdditive(timbre, frequencyHz, sampleRateHz, samples)
      break
    case 'fm':
      renderFm(timbre, frequencyHz, sampleRateHz, samples)
      break
    case 'plucked':
      renderPlucked(timbre, frequencyHz, sampleRateHz, samples)
      break
  }
  applyEnvelope(samples, envelope, heldSeconds, sampleRateHz)
  return samples
}
