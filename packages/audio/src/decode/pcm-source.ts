/** A block of decoded mono sound at the rate of the recording. */
export type PcmBlock = { readonly samples: Float32Array; readonly sampleRateHz: number }
