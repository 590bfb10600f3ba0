import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compareText } from '../compare-text.ts'
import { allocate, type WeightedKey } from './allocate.ts'

function parts(amount: bigint, weights: readonly bigint[]): bigint[] {
  const keyed = weights.map((weight, index) => ({ key: String.fromCharCode(97 + index), weight }))
  return [...allocate(amount, keyed).values()]
}

/** The slow way: count up whole units while they fit the quota, then hand out the rest one at a time. */
function allocateSlowly(amount: bigint, weights: readonly WeightedKey[]): Map<string, bigint> {
  const size = amount < 0n ? -amount : amount
  const total = weights.reduce((sum, { weight }) => sum + weight, 0n)
  const given = new Map<string, bigint>()
  for (const { key, weight } of weights) {
    let units = 0n
    while ((units + 1n) * total <= size * weight) units += 1n
    given.set(key, units)
  }
  const waiting = weights.map(({ key, weight }) => ({
    key,
    due: size * weight - (given.get(key) ?? 0n) * total,
  }))
  let left = size - [...given.values()].reduce((sum, units) => sum + units, 0n)
  while (left > 0n) {
    const next = waiting.reduce((best, other) => {
      if (other.due !== best.due) return other.due > best.due ? other : best
      return compareText(other.key, best.key) < 0 ? other : best
    })
    given.set(next.key, (given.get(next.key) ?? 0n) + 1n)
    waiting.splice(waiting.indexOf(next), 1)
    left -= 1n
  }
  return new Map([...given].map(([key, units]) => [key, amount < 0n ? -units : units]))
}

const weightedKeys = fc
  .uniqueArray(fc.string({ minLength: 1, maxLength: 3 }), { minLength: 1, maxLength: 12 })
  .chain((keys) =>
    fc.tuple(...keys.map((key) => fc.bigInt(0n, 50n).map((weight): WeightedKey => ({ key, weight })))),
  )
  .filter((weights) => weights.some(({ weight }) => weight > 0n))

describe('allocate', () => {
  it('apportions 60 seats over the populations of 1790 as published', () => {
    // Electowiki, "Hamilton method", example with the populations of the 1790 census and 60 seats.
    const populations = [
      ['Virginia', 630_560n, 11n],
      ['Massachusetts', 475_327n, 8n],
      ['Pennsylvania', 432_879n, 7n],
      ['North Carolina', 353_523n, 6n],
      ['New York', 331_589n, 6n],
      ['Maryland', 278_514n, 5n],
      ['Connecticut', 236_841n, 4n],
      ['South Carolina', 206_236n, 3n],
      ['New Jersey', 179_570n, 3n],
      ['New Hampshire', 141_822n, 2n],
      ['Vermont', 85_533n, 1n],
      ['Georgia', 70_835n, 1n],
      ['Kentucky', 68_705n, 1n],
      ['Rhode Island', 68_446n, 1n],
      ['Delaware', 55_540n, 1n],
    ] as const
    const seats = allocate(
      60n,
      populations.map(([key, weight]) => ({ key, weight })),
    )
    expect(Object.fromEntries(seats)).toEqual(
      Object.fromEntries(populations.map(([key, , seat]) => [key, seat])),
    )
  })

  it('apportions the classic six-party example', () => {
    // Votes and result of the textbook example of largest remainder with 10 seats; from memory, result recomputed.
    expect(parts(10n, [47_000n, 16_000n, 15_900n, 12_000n, 6_000n, 3_100n])).toEqual([5n, 2n, 1n, 1n, 1n, 0n])
  })

  it.each([
    [10_000n, [1n, 1n, 1n], [3334n, 3333n, 3333n]],
    [10_001n, [1n, 1n, 1n], [3334n, 3334n, 3333n]],
    [10_000n, [1n, 1n, 1n, 1n, 1n, 1n, 1n], [1429n, 1429n, 1429n, 1429n, 1428n, 1428n, 1428n]],
    [1n, [1n, 1n, 1n], [1n, 0n, 0n]],
    [100n, [3333n, 3333n, 3334n], [33n, 33n, 34n]],
    [12_345n, [50n, 25n, 25n], [6173n, 3086n, 3086n]],
    [0n, [2n, 1n], [0n, 0n]],
    [7n, [0n, 3n, 0n], [0n, 7n, 0n]],
    [-10_000n, [1n, 1n, 1n], [-3334n, -3333n, -3333n]],
  ])('divides %s by hand-computed vectors', (amount, weights, expected) => {
    expect(parts(amount, weights)).toEqual(expected)
  })

  it('lets a part shrink when the amount grows, as largest remainder must', () => {
    // The Alabama paradox: why a changed pot means a new statement and not a patched line.
    expect(parts(10n, [6n, 6n, 2n])).toEqual([4n, 4n, 2n])
    expect(parts(11n, [6n, 6n, 2n])).toEqual([5n, 5n, 1n])
  })

  it('settles equal fractions by the key, whatever the order of the claims', () => {
    const claims = ['c', 'a', 'b'].map((key) => ({ key, weight: 1n }))
    expect([...allocate(5n, claims)]).toEqual([
      ['a', 2n],
      ['b', 2n],
      ['c', 1n],
    ])
  })

  it('refuses to divide by nothing, by negative weights and by a key given twice', () => {
    expect(() => allocate(5n, [])).toThrow(expect.objectContaining({ code: 'nothing-to-divide-by' }))
    expect(() => parts(5n, [0n, 0n])).toThrow(expect.objectContaining({ code: 'nothing-to-divide-by' }))
    expect(() => parts(5n, [2n, -1n])).toThrow(expect.objectContaining({ code: 'invalid-weight' }))
    const twice = [1n, 2n].map((weight) => ({ key: 'a', weight }))
    expect(() => allocate(5n, twice)).toThrow(expect.objectContaining({ code: 'invalid-weight' }))
  })

  it('does not take numbers, which would be rounded', () => {
    // @ts-expect-error -- amounts are bigint by type.
    expect(() => allocate(0.5, [{ key: 'a', weight: 1n }])).toThrow(TypeError)
  })

  it('agrees with the slow way on any amount and weights', () => {
    fc.assert(
      fc.property(fc.bigInt(-300n, 300n), weightedKeys, (amount, weights) => {
        const fast = [...allocate(amount, weights)].toSorted(([left], [right]) => compareText(left, right))
        const slow = [...allocateSlowly(amount, weights)].toSorted(([left], [right]) =>
          compareText(left, right),
        )
        expect(fast).toEqual(slow)
      }),
    )
  })

  it('sums exactly, stays within one unit of each quota and ignores the order of claims', () => {
    const amounts = fc.bigInt(-(10n ** 24n), 10n ** 24n)
    const inTwoOrders = weightedKeys.chain((weights) =>
      fc.tuple(
        fc.constant(weights),
        fc.shuffledSubarray(weights, { minLength: weights.length, maxLength: weights.length }),
      ),
    )
    fc.assert(
      fc.property(amounts, inTwoOrders, (amount, [weights, shuffled]) => {
        const divided = allocate(amount, weights)
        const total = weights.reduce((sum, { weight }) => sum + weight, 0n)
        expect([...divided.values()].reduce((sum, part) => sum + part, 0n)).toBe(amount)
        for (const { key, weight } of weights) {
          const distance = (divided.get(key) ?? 0n) * total - amount * weight
          expect(distance < total && distance > -total).toBe(true)
          if (weight === 0n) expect(divided.get(key)).toBe(0n)
        }
        expect([...allocate(amount, shuffled)]).toEqual([...divided])
      }),
    )
  })
})
