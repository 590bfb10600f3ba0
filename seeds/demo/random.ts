/** A small generator of repeatable randomness (mulberry32): the demo is the same on every machine. */
export type Random = {
  /** 0 ≤ x < 1. */
  next: () => number
  /** A whole number from `low` to `high`, both included. */
  between: (low: number, high: number) => number
  pick: <Item>(items: readonly Item[]) => Item
  chance: (probability: number) => boolean
}

export function createRandom(seed: number): Random {
  let state = seed >>> 0
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32
  }
  const between = (low: number, high: number) => low + Math.floor(next() * (high - low + 1))
  return {
    next,
    between,
    pick(items) {
      const item = items[between(0, items.length - 1)]
      if (item === undefined) throw new RangeError('Nothing to pick from')
      return item
    },
    chance: (probability) => next() < probability,
  }
}
