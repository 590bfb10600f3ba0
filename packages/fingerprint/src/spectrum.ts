import FFT from 'fft.js'

/** Turns a stream of samples into power spectra of overlapping Hann-weighted frames. */
export type SpectrumAnalyser = {
  /** Calls `onRow` once per finished frame; the row is reused afterwards. */
  readonly push: (samples: Float32Array, onRow: (power: Float32Array) => void) => void
  /** Completes the last frames with silence. */
  readonly finish: (onRow: (power: Float32Array) => void) => void
}

function hann(size: number): Float64Array {
  // Periodic form: frames at a quarter-frame hop weigh every sample equally.
  return Float64Array.from({ length: size }, (_, n) => 0.5 - 0.5 * Math.cos((2 * Math.PI * n) / size))
}

/**
 * Half a frame of silence goes before the first sample, so that frame n is centred on sample n × hopSamples. Rows hold
 * frameSamples / 2 + 1 powers. Cost: one real transform per hop.
 */
export function createSpectrumAnalyser(frameSamples: number, hopSamples: number): SpectrumAnalyser {
  const transform = new FFT(frameSamples)
  const window = hann(frameSamples)
  const pending = new Float32Array(frameSamples)
  const weighted = new Float64Array(frameSamples)
  const spectrum = new Float64Array(frameSamples * 2)
  const power = new Float32Array(frameSamples / 2 + 1)
  let filled = frameSamples / 2

  const emitRow = (onRow: (power: Float32Array) => void): void => {
    for (let n = 0; n < frameSamples; n++) weighted[n] = pending[n] * window[n]
    transform.realTransform(spectrum, weighted)
    for (let bin = 0; bin < power.length; bin++) {
      const real = spectrum[2 * bin]
      const imaginary = spectrum[2 * bin + 1]
      power[bin] = real * real + imaginary * imaginary
    }
    onRow(power)
    pending.copyWithin(0, hopSamples)
    filled -= hopSamples
  }

  const push = (samples: Float32Array, onRow: (power: Float32Array) => void): void => {
    let taken = 0
    while (taken < samples.length) {
      const count = Math.min(frameSamples - filled, samples.length - taken)
      pending.set(samples.subarray(taken, taken + count), filled)
      filled += count
      taken += count
      if (filled === frameSamples) emitRow(onRow)
    }
  }

  return { push, finish: (onRow) => push(new Float32Array(frameSamples / 2), onRow) }
}
