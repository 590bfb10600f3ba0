import { createHalvingStage, type ResampleStage } from './halving-stage.ts'
import { createPolyphaseStage } from './polyphase-stage.ts'

/** Aliases and images end up this far below the signal. */
const ATTENUATION_DB = 85
/** The rate is halved while at least this many times the wanted rate is left for the last, steep filter. */
const HEADROOM = 1.3

/** Changes the sample rate of one mono stream. */
export type Resampler = {
  /** Takes the next samples and returns what can already be computed; the result does not depend on the blocks' sizes. */
  push: (block: Float32Array) => Float32Array
  /** Call once when the stream has ended. All outputs together last exactly as long as the input, to one sample. */
  finish: () => Float32Array
}

function planStages(fromHz: number, toHz: number): ResampleStage[] {
  const stages: ResampleStage[] = []
  let rateHz = fromHz
  while (rateHz % 2 === 0 && rateHz / 2 >= HEADROOM * toHz) {
    stages.push(createHalvingStage((0.5 * toHz) / rateHz, ATTENUATION_DB))
    rateHz /= 2
  }
  if (rateHz !== toHz) stages.push(createPolyphaseStage(rateHz, toHz, ATTENUATION_DB))
  return stages
}

/**
 * A sample-rate converter: half-band steps down, then one polyphase windowed-sinc filter. Delay is compensated, so
 * output sample n is the sound at n / toHz seconds. Flat within 0.1 dB up to 0.45 of the lower rate; what would alias
 * below that is at least 80 dB down.
 * @throws RangeError when a rate is not a positive integer.
 */
export function createResampler(fromHz: number, toHz: number): Resampler {
  if (!Number.isInteger(fromHz) || !Number.isInteger(toHz) || fromHz <= 0 || toHz <= 0) {
    throw new RangeError(`sample rates must be positive integers: ${fromHz} → ${toHz}`)
  }
  const stages = planStages(fromHz, toHz)
  if (stages.length === 0) return { push: (block) => block, finish: () => new Float32Array(0) }

  const passThrough = (block: Float32Array | Float64Array, from: number) =>
    stages.slice(from).reduce<Float32Array | Float64Array>((samples, stage) => stage.push(samples), block)

  return {
    push: (block) => Float32Array.from(passThrough(block, 0)),
    finish: () => {
      const parts = stages.map((stage, index) => passThrough(stage.finish(), index + 1))
      const output = new Float32Array(parts.reduce((total, part) => total + part.length, 0))
      let offset = 0
      for (const part of parts) {
        output.set(part, offset)
        offset += part.length
      }
      return output
    },
  }
}

/** Resamples a whole signal held in memory. */
export function resample(samples: Float32Array, fromHz: number, toHz: number): Float32Array {
  const resampler = createResampler(fromHz, toHz)
  const body = resampler.push(samples)
  const tail = resampler.finish()
  const output = new Float32Array(body.length + tail.length)
  output.set(body)
  output.set(tail, body.length)
  return output
}
