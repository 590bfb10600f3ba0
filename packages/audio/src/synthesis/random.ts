/** A repeatable source of chance: the same seed always gives the same sequence. */
export type Random = {
  /** From 0 up to, not including, 1. */
  next: () => number
  /** Evenly between two bounds. */
  between: (low: number, high: number) => number
  /** A whole number between two bounds, both included. */
  integer: (low: number, high: number) => number
  /** True with this probability. */
  chance: (probability: number) => boolean
  /** One of the values. @throws RangeError when there are none. */
  pick: <Value>(values: readonly Value[]) => Value
  /** An independent sequence of its own, so that drawing more in one place changes nothing in another. */
  branch: (name: string) => Random
}

/** Spreads any text and number over 32 bits (FNV-1a). */
function hash(text: string, seed: number): number {
  let value = 0x811c9dc5 ^ seed
  for (let i = 0; i < text.length; i++) value = Math.imul(value ^ text.charCodeAt(i), 0x01000193)
  return value >>> 0
}

/** Creates a repeatable source of chance (Mulberry32: a 32-bit counter through an integer mix). */
export function createRandom(seed: number): Random {
  const origin = hash('random', Math.trunc(seed) >>> 0)
  let state = origin
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32
  }
  const random: Random = {
    next,
    between: (low, high) => low + (high - low) * next(),
    integer: (low, high) => low + Math.floor((high - low + 1) * next()),
    chance: (probability) => next() < probability,
    pick: (values) => {
      const value = values[Math.floor(next() * values.length)]
      if (value === undefined) throw new RangeError('nothing to pick from')
      return value
    },
    branch: (name) => createRandom(hash(name, origin)),
  }
  return random
}
