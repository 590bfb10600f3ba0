import { compareText } from '../compare-text.ts'
import { RoyaltyError } from '../royalty-error.ts'

/** One claim on what is divided. Keys are unique; they name the claim and settle ties. */
export type WeightedKey = { readonly key: string; readonly weight: bigint }

type Quota = { key: string; floor: bigint; remainder: bigint }

/**
 * Divides an amount in proportion to the weights by largest remainder (Hamilton's method): everyone gets the whole
 * units of their exact quota, and the units left over go one each to the largest fractions. Equal fractions are
 * settled by the key, ascending by code unit. A negative amount is divided as its positive and negated.
 *
 * The parts sum to the amount exactly, and each lies within one unit of its exact quota.
 *
 * @returns the parts by key, in ascending order of the keys
 * @throws RoyaltyError `nothing-to-divide-by` when no weight is above zero; `invalid-weight` on a negative weight or
 * a key given twice
 */
export function allocate(amount: bigint, weights: readonly WeightedKey[]): ReadonlyMap<string, bigint> {
  const total = sumOfWeights(weights)
  const size = amount < 0n ? -amount : amount
  const quotas = weights
    .map(({ key, weight }): Quota => {
      const product = size * weight
      return { key, floor: product / total, remainder: product % total }
    })
    .sort((left, right) => compareText(left.key, right.key))
  const parts = new Map(quotas.map(({ key, floor }) => [key, floor]))
  if (parts.size !== weights.length) {
    throw new RoyaltyError('invalid-weight', 'Two of the claims on an amount carry the same key.')
  }
  const leftOver = Number(size - quotas.reduce((sum, { floor }) => sum + floor, 0n))
  // Sorting is stable, so quotas with equal remainders stay in the order of their keys.
  const byRemainder = quotas.toSorted((left, right) => compareDescending(left.remainder, right.remainder))
  for (const { key, floor } of byRemainder.slice(0, leftOver)) parts.set(key, floor + 1n)
  if (amount >= 0n) return parts
  return new Map([...parts].map(([key, part]) => [key, -part]))
}

function sumOfWeights(weights: readonly WeightedKey[]): bigint {
  let total = 0n
  for (const { key, weight } of weights) {
    if (weight < 0n) throw new RoyaltyError('invalid-weight', `The weight of ${key} is negative.`)
    total += weight
  }
  if (total === 0n) {
    throw new RoyaltyError('nothing-to-divide-by', 'An amount cannot be divided when every weight is zero.')
  }
  return total
}

function compareDescending(left: bigint, right: bigint): number {
  if (left > right) return -1
  return left < right ? 1 : 0
}
