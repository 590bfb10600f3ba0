import { engineParameters, HASH_BITS } from './parameters.ts'
import type { PeakStore } from './peak-store.ts'

const { maximumBinDistance, maximumFrameDistance } = engineParameters
const HASH_MASK = 2 ** HASH_BITS - 1
/** Odd, so multiplication modulo 2^22 is one-to-one: it spreads the popular low frequencies over the whole table. */
const SPREAD = 0x2c1b3d

/** How peaks are joined to landmarks. */
export type PairingOptions = {
  /** Peaks of a higher rank are left out. */
  readonly maximumRank: number
  /** Landmarks per anchor peak, nearest in time first. */
  readonly fanOut: number
  /** How much faster than the reference the sound runs; times and, if asked for, frequencies are brought back. */
  readonly speedRatio: number
  readonly pitchFollowsSpeed: boolean
  /** Also give the hash on the other side of a rounding boundary closer than this (0 … 0.5). */
  readonly boundaryMargin: number
}

/** Takes a landmark: its hash, and its anchor's frame on the reference's time scale. */
export type LandmarkSink = (hash: number, anchorFrame: number, targetFrame: number) => void

/** Packs frequency, frequency distance and time distance into a number of {@link HASH_BITS} bits. */
export function packHash(bin: number, binDistance: number, frameDistance: number): number {
  const packed = (bin << 13) | ((binDistance + 64) << 6) | frameDistance
  return Math.imul(packed, SPREAD) & HASH_MASK
}

/** The other integer next to `value` when it lies close to the boundary between two, else the same. */
function otherSide(value: number, rounded: number, margin: number): number {
  const fraction = value - rounded
  if (fraction > 0.5 - margin) return rounded + 1
  if (fraction < margin - 0.5) return rounded - 1
  return rounded
}

function isDistanceValid(binDistance: number, frameDistance: number): boolean {
  return (
    Math.abs(binDistance) <= maximumBinDistance && frameDistance >= 1 && frameDistance <= maximumFrameDistance
  )
}

function emitPair(
  bin: number,
  binDistance: number,
  frameDistance: number,
  margin: number,
  anchorFrame: number,
  sink: LandmarkSink,
): void {
  const roundBin = Math.round(bin)
  const roundBins = Math.round(binDistance)
  const roundFrames = Math.round(frameDistance)
  const lastBin = otherSide(bin, roundBin, margin)
  const lastBins = otherSide(binDistance, roundBins, margin)
  const lastFrames = otherSide(frameDistance, roundFrames, margin)
  for (let a = roundBin; ; a = lastBin) {
    for (let b = roundBins; ; b = lastBins) {
      for (let c = roundFrames; ; c = lastFrames) {
        if (isDistanceValid(b, c)) sink(packHash(a, b, c), anchorFrame, anchorFrame + frameDistance)
        if (c === lastFrames) break
      }
      if (b === lastBins) break
    }
    if (a === lastBin) break
  }
}

/**
 * Joins each peak of the whole frames [fromFrame, toFrame) with the next peaks near it in frequency. The store must
 * already hold the peaks up to maximumFrameDistance × speedRatio frames later.
 */
export function pairPeaks(
  peaks: PeakStore,
  fromFrame: number,
  toFrame: number,
  options: PairingOptions,
  sink: LandmarkSink,
): void {
  const { maximumRank, fanOut, speedRatio, pitchFollowsSpeed, boundaryMargin } = options
  const pitch = pitchFollowsSpeed ? 1 / speedRatio : 1
  const end = peaks.firstAtOrAfter(toFrame)
  const count = peaks.count()
  for (let anchor = peaks.firstAtOrAfter(fromFrame); anchor < end; anchor++) {
    if (peaks.rank(anchor) > maximumRank) continue
    const frame = peaks.frame(anchor) * speedRatio
    const bin = peaks.bin(anchor) * pitch
    if (bin > 511) continue
    let left = fanOut
    for (let target = anchor + 1; target < count && left > 0; target++) {
      const frameDistance = peaks.frame(target) * speedRatio - frame
      if (frameDistance > maximumFrameDistance + 1) break
      if (frameDistance < 0.5 || peaks.rank(target) > maximumRank) continue
      const binDistance = peaks.bin(target) * pitch - bin
      if (Math.abs(binDistance) > maximumBinDistance) continue
      left--
      emitPair(bin, binDistance, frameDistance, boundaryMargin, frame, sink)
    }
  }
}
