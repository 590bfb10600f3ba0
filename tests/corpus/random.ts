/** A seeded source of numbers in [0, 1): the same corpus on every machine. */
export type Random = () => number

/** Generator "mulberry32" (T. Ettinger, public domain). */
export function createRandom(seed: number): Random {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let t = Math.imul(state ^ (state >>> 15), 1 | state)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32
  }
}

/** A shuffled copy (Fisher and Yates). */
export function shuffled<Item>(items: readonly Item[], random: Random): Item[] {
  const left = [...items]
  const result: Item[] = []
  while (left.length > 0) result.push(...left.splice(Math.floor(random() * left.length), 1))
  return result
}

/** White noise of root mean square 1. */
export function noise(length: number, random: Random): Float32Array {
  // The sum of twelve uniform numbers less six is close enough to normal.
  return Float32Array.from({ length }, () => {
    let sum = -6
    for (let i = 0; i < 12; i++) sum += random()
    return sum
  })
}
