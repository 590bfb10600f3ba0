import { compareText } from '../compare-text.ts'
import { type Distribution } from './distribution.ts'

/**
 * The distribution as canonical JSON: keys ascending, amounts and weights as decimal strings, no spaces. The same
 * input, in any order, gives the same text byte for byte, so two calculations can be compared by a checksum.
 */
export function serialiseDistribution(distribution: Distribution): string {
  return JSON.stringify(distribution, (_key, value: unknown) => {
    if (typeof value === 'bigint') return value.toString()
    if (typeof value !== 'object' || value === null || Array.isArray(value)) return value
    return Object.fromEntries(Object.entries(value).sort(([left], [right]) => compareText(left, right)))
  })
}
