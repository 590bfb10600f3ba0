import { divideHalfEven } from '../apportionment/divide-half-even.ts'
import { requireInput } from '../royalty-error.ts'

/**
 * The part of a monthly fee due for the days a licence covers: fee × covered days ÷ days in the month, rounded once
 * to the minor unit, a half to the even unit. A month covered in full costs exactly the fee.
 *
 * @throws RoyaltyError `invalid-input` unless 0 ≤ covered days ≤ days in the month, both whole numbers
 */
export function proRataByDays(feeMinor: bigint, coveredDays: number, daysInMonth: number): bigint {
  requireInput(
    Number.isInteger(coveredDays) && Number.isInteger(daysInMonth),
    'A fee is divided by whole days.',
  )
  requireInput(
    daysInMonth >= 28 && daysInMonth <= 31 && coveredDays >= 0 && coveredDays <= daysInMonth,
    `A licence cannot cover ${coveredDays} of ${daysInMonth} days of a month.`,
  )
  return divideHalfEven(feeMinor * BigInt(coveredDays), BigInt(daysInMonth))
}
