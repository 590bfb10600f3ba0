/**
 * Weights of the usual speaker orders (WAV order: left, right, centre, low frequency, surrounds), after
 * ITU-R BS.775 annex 4 (from memory): centre and surrounds at −3 dB into left and right, low frequency left out.
 */
const MINUS_3_DB = Math.SQRT1_2
const SURROUND_WEIGHTS: { readonly [channels: number]: readonly number[] } = {
  3: [0.5, 0.5, MINUS_3_DB],
  5: [0.5, 0.5, MINUS_3_DB, MINUS_3_DB / 2, MINUS_3_DB / 2],
  6: [0.5, 0.5, MINUS_3_DB, 0, MINUS_3_DB / 2, MINUS_3_DB / 2],
  8: [0.5, 0.5, MINUS_3_DB, 0, MINUS_3_DB / 2, MINUS_3_DB / 2, MINUS_3_DB / 2, MINUS_3_DB / 2],
}

/** Mixes channels to one that cannot clip: weights sum to one. */
export function downmix(channels: readonly Float32Array[]): Float32Array {
  const [first, second] = channels
  if (!first) return new Float32Array(0)
  if (channels.length === 1) return first
  const mono = new Float32Array(first.length)
  if (second && channels.length === 2) {
    for (let i = 0; i < mono.length; i++) mono[i] = 0.5 * ((first[i] ?? 0) + (second[i] ?? 0))
    return mono
  }
  const weights = SURROUND_WEIGHTS[channels.length] ?? channels.map(() => 1)
  const total = weights.reduce((sum, weight) => sum + weight, 0)
  channels.forEach((channel, index) => {
    const weight = (weights[index] ?? 0) / total
    if (weight === 0) return
    for (let i = 0; i < mono.length; i++) mono[i] = (mono[i] ?? 0) + weight * (channel[i] ?? 0)
  })
  return mono
}
