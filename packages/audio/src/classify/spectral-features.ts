import Meyda from 'meyda'

/** What one frame's spectrum says about the kind of sound. */
export type SpectralFeatures = {
  /** 0 for a tone … 1 for noise. */
  readonly flatness: number
  /** Centre of gravity of the spectrum, as a share of the Nyquist frequency. */
  readonly centroid: number
  /** Magnitudes of the spectrum, for comparing one frame with the next. */
  readonly magnitudes: Float32Array
}

/**
 * Measures frames of one length. Meyda keeps its settings in one global object, so all use of it is here.
 * @param frameSamples a power of two
 */
export function measureSpectrum(frame: Float32Array): SpectralFeatures {
  Meyda.bufferSize = frame.length
  Meyda.windowingFunction = 'hanning'
  const found = Meyda.extract(['spectralFlatness', 'spectralCentroid', 'amplitudeSpectrum'], frame)
  const centroid = (found?.spectralCentroid ?? 0) / (frame.length / 2)
  const flatness = found?.spectralFlatness ?? 0
  return {
    flatness: Number.isFinite(flatness) ? flatness : 0,
    centroid: Number.isFinite(centroid) ? centroid : 0,
    magnitudes: found?.amplitudeSpectrum ?? new Float32Array(frame.length / 2),
  }
}
