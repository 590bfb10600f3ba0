import type { DistributionView } from '@fieldfare/contracts'
import { formatPpm } from '../../lib/format.ts'

/** Adds minor units exactly. */
export function sumMinor(amounts: readonly string[]): bigint {
  return amounts.reduce((sum, amount) => sum + BigInt(amount), 0n)
}

/** Every deduction that occurs at some station, in the order of the first that has it, named with its rate. */
export function deductionColumns(stations: DistributionView['stations']): { key: string; label: string }[] {
  const labels = new Map<string, { label: string; rates: Set<number> }>()
  for (const { code, label, ratePpm } of stations.flatMap(({ deductions }) => deductions)) {
    const known = labels.get(code) ?? { label, rates: new Set<number>() }
    known.rates.add(ratePpm)
    labels.set(code, known)
  }
  return [...labels].map(([key, { label, rates }]) => {
    const [rate] = rates
    return { key, label: rates.size === 1 && rate !== undefined ? `${label} (${formatPpm(rate)})` : label }
  })
}
