import { kaiserDesign, windowedSinc } from './filter-design.ts'
import { SampleHistory } from './sample-history.ts'

/** One step of a sample-rate change; the same samples come out however the input is cut into blocks. */
export type ResampleStage = {
  push: (block: Float32Array | Float64Array) => Float64Array
  /** Everything still inside, once the stream has ended. */
  finish: () => Float64Array
}

/**
 * Halves the sample rate with a half-band filter: every second coefficient is zero and the rest come in pairs, so it is
 * several times cheaper than a general filter (Mitra, Digital Signal Processing, "half-band filters"; common practice).
 * @param keptBand upper edge of what must survive, as a fraction of the input rate (< 0.25)
 */
export function createHalvingStage(keptBand: number, attenuationDb: number): ResampleStage {
  const { beta, lengthSamples } = kaiserDesign(attenuationDb, 0.5 - 2 * keptBand)
  const pairs = Math.ceil((lengthSamples / 2 + 1) / 2)
  const reach = 2 * pairs - 1
  const sinc = windowedSinc(0.25, reach + 1, beta)
  const coefficients = Float64Array.from({ length: pairs }, (_, k) => sinc(2 * k + 1))
  // Scale so that a constant stays what it is: centre tap 1/2, pairs summing to the other half.
  const sum = 2 * coefficients.reduce((total, value) => total + value, 0)
  for (let k = 0; k < pairs; k++) coefficients[k] = (coefficients[k] ?? 0) * (0.5 / sum)

  const history = new SampleHistory(reach)
  let nextCentre = 0

  const produce = (endCentre: number): Float64Array => {
    const count = Math.max(0, Math.ceil((endCentre - nextCentre) / 2))
    const output = new Float64Array(count)
    const { samples } = history
    let centre = nextCentre - history.startPosition
    for (let i = 0; i < count; i++, centre += 2) {
      let value = 0.5 * (samples[centre] ?? 0)
      for (let k = 0, left = centre - 1, right = centre + 1; k < pairs; k++, left -= 2, right += 2) {
        value += (coefficients[k] ?? 0) * ((samples[left] ?? 0) + (samples[right] ?? 0))
      }
      output[i] = value
    }
    nextCentre += 2 * count
    history.discardBefore(nextCentre - reach)
    return output
  }

  return {
    push: (block) => {
      history.append(block)
      return produce(history.endPosition - reach)
    },
    finish: () => {
      const end = history.endPosition
      history.append(new Float64Array(reach))
      return produce(end)
    },
  }
}
