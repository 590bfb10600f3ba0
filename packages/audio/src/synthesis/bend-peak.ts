/** From here on peaks are bent, so that they never reach {@link LARGEST_PEAK}. */
const BEND_FROM = 0.55
/** No sample of generated audio is larger. */
export const LARGEST_PEAK = 0.92

/** Leaves quiet samples as they are and bends loud ones, smoothly, into the range: nothing is clipped. */
export function bendPeak(value: number): number {
  const excess = Math.abs(value) - BEND_FROM
  if (excess <= 0) return value
  const room = LARGEST_PEAK - BEND_FROM
  return Math.sign(value) * (BEND_FROM + room * Math.tanh(excess / room))
}
