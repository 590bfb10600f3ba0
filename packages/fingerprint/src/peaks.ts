import { engineParameters } from './parameters.ts'

/**
 * Takes one spectral peak. `rank` 0 is a peak that dominates the widest neighbourhood (kept for references), 1 and 2
 * dominate smaller ones only (used when searching a log, where speech or noise may mask the strongest).
 */
export type PeakSink = (frame: number, bin: number, rank: number) => void

export type PeakPicker = {
  readonly push: (power: Float32Array) => void
  readonly finish: () => void
  /** Peaks of frames below this number have all been given out. */
  readonly completeFrames: () => number
}

const { lowestBin, highestBin, peakReachFrames, peakReachBins } = engineParameters
const BINS = engineParameters.frameSamples / 2 + 1
const STEP = peakReachBins[2]
const REACH = peakReachFrames[0]
const RING = 2 * REACH + 1
/** Room on both sides, so that neighbourhoods need no bounds checks. */
const MARGIN = 3 * STEP
const WIDTH = BINS + 2 * MARGIN
/** Power of a sine of amplitude 3e-5 (about one unit of 16 bits): below is silence. */
const SILENCE_POWER = (3e-5 * (engineParameters.frameSamples / 4)) ** 2

/** Largest power within ±STEP bins, by doubling windows of 2, 4 and 8 bins (STEP is 6, the window 13). */
function spreadMaxima(power: Float32Array, scratch: Float32Array, maxima: Float32Array): void {
  const last = WIDTH - 13
  scratch.set(power)
  for (let reach = 1; reach <= 4; reach *= 2) {
    for (let i = 0; i < WIDTH - reach; i++) {
      const next = scratch[i + reach]
      if (next > scratch[i]) scratch[i] = next
    }
  }
  for (let i = 0; i <= last; i++) {
    const left = scratch[i]
    const right = scratch[i + 5]
    maxima[i + STEP] = left > right ? left : right
  }
}

/** Just under a half, so that rounding a peak's place always gives back its row. */
const LARGEST_SHIFT = 0.499

/** Vertex of the parabola through three neighbouring log powers, within ±0.5 of the middle one. */
function vertex(before: number, middle: number, after: number): number {
  if (before <= 0 || after <= 0) return 0
  const left = Math.log(middle / before)
  const right = Math.log(middle / after)
  const curvature = left + right
  if (curvature <= 0) return 0
  const shift = (0.5 * (left - right)) / curvature
  return Math.max(-LARGEST_SHIFT, Math.min(LARGEST_SHIFT, shift))
}

/**
 * Finds the points of a spectrogram that are largest in a rectangle of time and frequency around them, and places them
 * between frames and bins by parabolic interpolation. Peaks come out ordered by frame, then bin.
 */
export function createPeakPicker(onPeak: PeakSink): PeakPicker {
  const powers = Array.from({ length: RING }, () => new Float32Array(WIDTH))
  const maxima = Array.from({ length: RING }, () => new Float32Array(WIDTH))
  const scratch = new Float32Array(WIDTH)
  let rows = 0

  const dominates = (centre: number, column: number, value: number, rank: number): boolean => {
    const reach = peakReachFrames[rank] ?? REACH
    const widest = 2 - rank
    for (let distance = -reach; distance <= reach; distance++) {
      const row = maxima[(centre + distance + RING) % RING]
      for (let side = -widest; side <= widest; side++) {
        if (row[column + side * STEP] > value) return false
      }
    }
    return true
  }

  const scanRow = (frame: number): void => {
    const centre = frame % RING
    const power = powers[centre]
    const spread = maxima[centre]
    const earlier = powers[(centre + RING - 1) % RING]
    const later = powers[(centre + 1) % RING]
    for (let column = lowestBin + MARGIN; column <= highestBin + MARGIN; column++) {
      const value = power[column]
      if (value < spread[column] || value < SILENCE_POWER) continue
      if (!dominates(centre, column, value, 2)) continue
      const rank = dominates(centre, column, value, 1) ? (dominates(centre, column, value, 0) ? 0 : 1) : 2
      const bin = column - MARGIN + vertex(power[column - 1], value, power[column + 1])
      onPeak(frame + vertex(earlier[column], value, later[column]), bin, rank)
    }
  }

  const pushRow = (row: Float32Array | null): void => {
    const slot = powers[rows % RING]
    slot.fill(0)
    if (row) slot.set(row.subarray(lowestBin - 1, highestBin + 2), MARGIN + lowestBin - 1)
    spreadMaxima(slot, scratch, maxima[rows % RING])
    rows++
    if (rows > REACH) scanRow(rows - 1 - REACH)
  }

  return {
    push: pushRow,
    finish() {
      for (let n = 0; n < REACH; n++) pushRow(null)
    },
    completeFrames: () => Math.max(0, rows - REACH),
  }
}
