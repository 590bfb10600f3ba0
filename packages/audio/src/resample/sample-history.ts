/**
 * The samples a filter can still reach, as one growing window over the stream. Positions count from the first sample
 * of the stream; before it and behind the end there is silence.
 */
export class SampleHistory {
  /** Position in the stream of `samples[0]`. */
  startPosition: number
  endPosition: number
  samples: Float64Array

  constructor(silenceBefore: number) {
    this.startPosition = -silenceBefore
    this.endPosition = 0
    this.samples = new Float64Array(silenceBefore + 16_384)
  }

  append(block: Float32Array | Float64Array): void {
    const used = this.endPosition - this.startPosition
    if (used + block.length > this.samples.length) {
      const larger = new Float64Array(2 * (used + block.length))
      larger.set(this.samples.subarray(0, used))
      this.samples = larger
    }
    this.samples.set(block, used)
    this.endPosition += block.length
  }

  /** Drops everything before a position. */
  discardBefore(position: number): void {
    const drop = position - this.startPosition
    if (drop <= 0) return
    this.samples.copyWithin(0, drop, this.endPosition - this.startPosition)
    this.startPosition = position
  }
}
