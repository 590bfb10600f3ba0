import { kaiserDesign, windowedSinc } from './filter-design.ts'
import type { ResampleStage } from './halving-stage.ts'
import { SampleHistory } from './sample-history.ts'

function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestCommonDivisor(b, a % b)
}

/** Width of the transition band around the lower Nyquist frequency, as a fraction of the lower rate. */
const TRANSITION = 0.1
/** Ratios with more phases than this (odd rates such as 44,101 Hz) use the nearest of this many phases. */
const MAXIMUM_PHASES = 2048

/** One row of coefficients per phase, each row summing to one so that no phase is louder than another. */
function designPhases(phases: number, cutoff: number, reach: number, beta: number): Float64Array {
  const taps = 2 * reach
  const sinc = windowedSinc(cutoff, reach, beta)
  const table = new Float64Array(phases * taps)
  for (let phase = 0; phase < phases; phase++) {
    const row = table.subarray(phase * taps, (phase + 1) * taps)
    let sum = 0
    for (let k = 0; k < taps; k++) {
      const value = sinc(k - (reach - 1) - phase / phases)
      row[k] = value
      sum += value
    }
    for (let k = 0; k < taps; k++) row[k] = (row[k] ?? 0) / sum
  }
  return table
}

/**
 * Changes the sample rate by the exact ratio of two integers with a polyphase windowed sinc (Crochiere & Rabiner 1983).
 * Flat to 0.45 of the lower rate, −attenuation from 0.55 of it.
 */
export function createPolyphaseStage(fromHz: number, toHz: number, attenuationDb: number): ResampleStage {
  const divisor = greatestCommonDivisor(fromHz, toHz)
  const up = toHz / divisor
  const down = fromHz / divisor
  const phases = Math.min(up, MAXIMUM_PHASES)
  const lowerRate = Math.min(fromHz, toHz)
  const { beta, lengthSamples } = kaiserDesign(attenuationDb, (TRANSITION * lowerRate) / fromHz)
  // A multiple of two on each side, so that the inner loop can take four taps at a time.
  const reach = 2 * Math.ceil((lengthSamples / 2 + 1) / 2)
  const taps = 2 * reach
  const table = designPhases(phases, lowerRate / fromHz / 2, reach, beta)

  const history = new SampleHistory(reach)
  /** Output sample n stands at input position whole + fraction / up. */
  let whole = 0
  let fraction = 0
  const stepWhole = Math.floor(down / up)
  const stepFraction = down % up

  const produce = (endPosition: number): Float64Array => {
    const estimate = Math.max(0, Math.ceil(((endPosition - whole) * up) / down) + 1)
    const output = new Float64Array(estimate)
    const { samples, startPosition } = history
    let count = 0
    while (whole < endPosition) {
      const exactPhase = phases === up ? fraction : Math.round((fraction * phases) / up)
      const isNext = exactPhase === phases
      const row = (isNext ? 0 : exactPhase) * taps
      const first = whole + (isNext ? 1 : 0) - reach + 1 - startPosition
      let a = 0
      let b = 0
      let c = 0
      let d = 0
      for (let k = 0; k < taps; k += 4) {
        a += (table[row + k] ?? 0) * (samples[first + k] ?? 0)
        b += (table[row + k + 1] ?? 0) * (samples[first + k + 1] ?? 0)
        c += (table[row + k + 2] ?? 0) * (samples[first + k + 2] ?? 0)
        d += (table[row + k + 3] ?? 0) * (samples[first + k + 3] ?? 0)
      }
      output[count++] = a + b + (c + d)
      whole += stepWhole
      fraction += stepFraction
      if (fraction >= up) {
        fraction -= up
        whole += 1
      }
    }
    history.discardBefore(whole - reach)
    return output.subarray(0, count)
  }

  return {
    push: (block) => {
      history.append(block)
      return produce(history.endPosition - reach - 1)
    },
    finish: () => {
      const end = history.endPosition
      history.append(new Float64Array(reach + 2))
      return produce(end)
    },
  }
}
