/** Hits of the last few blocks of a log: where in the catalogue, and at which frame of the log. */
export type HitBlock = { positions: Uint32Array; frames: Int32Array; length: number }

/** A queue of blocks whose memory is used again. */
export type HitBlocks = {
  readonly newest: () => HitBlock
  readonly append: (position: number, frame: number) => void
  /** Begins a new block; gives each block beyond the `keep` newest to `onDropped`. */
  readonly next: (keep: number, onDropped: (block: HitBlock) => void) => void
  readonly totalHits: () => number
}

function grown(block: HitBlock): HitBlock {
  const positions = new Uint32Array(block.positions.length * 2)
  const frames = new Int32Array(block.frames.length * 2)
  positions.set(block.positions)
  frames.set(block.frames)
  return { positions, frames, length: block.length }
}

export function createHitBlocks(): HitBlocks {
  const emptyBlock = (): HitBlock => ({
    positions: new Uint32Array(1024),
    frames: new Int32Array(1024),
    length: 0,
  })
  const blocks: HitBlock[] = []
  const spare: HitBlock[] = []
  let newest = emptyBlock()
  return {
    newest: () => newest,
    append(position, frame) {
      if (newest.length === newest.positions.length) newest = grown(newest)
      newest.positions[newest.length] = position
      newest.frames[newest.length] = frame
      newest.length++
    },
    next(keep, onDropped) {
      blocks.push(newest)
      while (blocks.length >= keep) {
        const dropped = blocks.shift()
        if (!dropped) break
        onDropped(dropped)
        dropped.length = 0
        spare.push(dropped)
      }
      newest = spare.pop() ?? emptyBlock()
    },
    totalHits: () => blocks.reduce((sum, block) => sum + block.length, newest.length),
  }
}
