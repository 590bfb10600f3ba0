import { divideHalfEven } from '../apportionment/divide-half-even.ts'
import { compareText } from '../compare-text.ts'
import { requireInput } from '../royalty-error.ts'

/** Parts per million in a whole: the unit of every rate and share. */
export const WHOLE_PPM = 1_000_000

/** A deduction the society has decided on, by name, at a rate of the fee. */
export type DeductionRule = { readonly code: string; readonly label: string; readonly ratePpm: number }

/** One named deduction taken from one amount. */
export type DeductionLine = DeductionRule & { readonly amountMinor: bigint }

/** An amount, each deduction from it by name, and what is left. */
export type DeductedAmount = {
  readonly grossMinor: bigint
  readonly deductions: readonly DeductionLine[]
  readonly netMinor: bigint
}

/**
 * Takes every deduction at its rate of the gross amount (not of what earlier deductions left), each rounded once to
 * the minor unit, a half to the even unit. In the order of their codes, a deduction takes no more than is left:
 * rates that together reach the whole could otherwise round up to more than there is.
 *
 * @throws RoyaltyError `invalid-input` on a negative gross, a code used twice, or rates outside 0 to 100 % together
 */
export function applyDeductions(grossMinor: bigint, rules: readonly DeductionRule[]): DeductedAmount {
  requireInput(grossMinor >= 0n, 'Deductions are taken from an amount of zero or more.')
  requireInput(new Set(rules.map(({ code }) => code)).size === rules.length, 'A deduction is listed twice.')
  requireInput(
    rules.every(({ ratePpm }) => Number.isInteger(ratePpm) && ratePpm >= 0),
    'A deduction has a rate of zero or more, in whole parts per million.',
  )
  const totalPpm = rules.reduce((sum, { ratePpm }) => sum + ratePpm, 0)
  requireInput(totalPpm <= WHOLE_PPM, 'The deductions together take more than the whole fee.')
  let netMinor = grossMinor
  const deductions = rules
    .toSorted((left, right) => compareText(left.code, right.code))
    .map(({ code, label, ratePpm }): DeductionLine => {
      const exact = divideHalfEven(grossMinor * BigInt(ratePpm), BigInt(WHOLE_PPM))
      const amountMinor = exact < netMinor ? exact : netMinor
      netMinor -= amountMinor
      return { code, label, ratePpm, amountMinor }
    })
  return { grossMinor, deductions, netMinor }
}
