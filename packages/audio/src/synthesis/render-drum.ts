import type { Random } from './random.ts'
import type { Drum } from './tune.ts'

type DrumSound = {
  readonly seconds: number
  /** Pitch at the stroke and where it falls to; 0 for none. */
  readonly startHz: number
  readonly endHz: number
  readonly toneLevel: number
  readonly toneDecaySeconds: number
  readonly noiseLevel: number
  readonly noiseDecaySeconds: number
  /** How much of the low end of the noise is taken away, 0 … 1. */
  readonly noiseBrightness: number
}

function drawSound(random: Random, drum: Drum): DrumSound {
  const tone = (startHz: number, endHz: number, toneDecaySeconds: number, toneLevel: number) => ({
    startHz: startHz * random.between(0.85, 1.15),
    endHz: endHz * random.between(0.85, 1.15),
    toneDecaySeconds: toneDecaySeconds * random.between(0.7, 1.3),
    toneLevel,
  })
  const noise = (noiseLevel: number, noiseDecaySeconds: number, noiseBrightness: number) => ({
    noiseLevel,
    noiseDecaySeconds: noiseDecaySeconds * random.between(0.7, 1.3),
    noiseBrightness: Math.min(0.97, noiseBrightness * random.between(0.9, 1.1)),
  })
  const silentTone = tone(0, 0, 0.1, 0)
  switch (drum) {
    case 'kick':
      return { seconds: 0.35, ...tone(150, 48, 0.1, 1), ...noise(0.15, 0.006, 0.4) }
    case 'snare':
      return { seconds: 0.3, ...tone(240, 180, 0.06, 0.5), ...noise(0.6, 0.08, 0.5) }
    case 'tom':
      return { seconds: 0.4, ...tone(170, 95, 0.12, 0.9), ...noise(0.1, 0.02, 0.3) }
    case 'hat':
      return { seconds: 0.09, ...silentTone, ...noise(0.5, 0.02, 0.93) }
    case 'openHat':
      return { seconds: 0.35, ...silentTone, ...noise(0.45, 0.1, 0.93) }
    case 'shaker':
      return { seconds: 0.12, ...silentTone, ...noise(0.4, 0.035, 0.85) }
  }
}

/** The sound of one stroke on a drum of this tune's kit. */
export function renderDrum(random: Random, drum: Drum, sampleRateHz: number): Float32Array {
  const sound = drawSound(random, drum)
  const output = new Float32Array(Math.round(sound.seconds * sampleRateHz))
  const toneDecay = Math.exp(-1 / (sound.toneDecaySeconds * sampleRateHz))
  const noiseDecay = Math.exp(-1 / (sound.noiseDecaySeconds * sampleRateHz))
  const pitchFall = Math.exp(-1 / (0.03 * sampleRateHz))
  let frequencyHz = sound.startHz
  let phase = 0
  let toneLevel = sound.toneLevel
  let noiseLevel = sound.noiseLevel
  let low = 0
  for (let i = 0; i < output.length; i++) {
    phase += (2 * Math.PI * frequencyHz) / sampleRateHz
    frequencyHz = sound.endHz + (frequencyHz - sound.endHz) * pitchFall
    const white = random.between(-1, 1)
    low += (1 - sound.noiseBrightness) * (white - low)
    const fadeOut = Math.min(1, (output.length - i) / (0.1 * output.length))
    output[i] = fadeOut * (toneLevel * Math.sin(phase) + noiseLevel * (white - low))
    toneLevel *= toneDecay
    noiseLevel *= noiseDecay
  }
  return output
}
