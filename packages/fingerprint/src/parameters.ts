/**
 * The numbers that give a landmark its meaning. Changing any of them makes stored fingerprints useless, so
 * {@link ENGINE_VERSION} must change with them.
 */
export const engineParameters = {
  sampleRateHz: 8000,
  frameSamples: 1024,
  hopSamples: 256,
  /** Bins outside carry rumble or the slope of the resampler's filter. */
  lowestBin: 12,
  highestBin: 500,
  /** Reach of the neighbourhoods in which a peak must be the largest, strictest first. */
  peakReachFrames: [8, 6, 4],
  peakReachBins: [18, 12, 6],
  /** A landmark joins peaks at most this far apart. */
  maximumFrameDistance: 63,
  maximumBinDistance: 63,
  referenceFanOut: 4,
} as const

/** Names the engine and the shape of its fingerprints. */
export const ENGINE_VERSION = 'landmark-1'

/** Frame n is centred on sample n × hopSamples, so n frames last n times this many seconds. */
export const SECONDS_PER_FRAME = engineParameters.hopSamples / engineParameters.sampleRateHz

/** 9 bits of frequency, 7 of frequency distance, 6 of time distance. */
export const HASH_BITS = 22
