import type { LocalDate } from '@fieldfare/contracts'
import { localDateSchema } from '@fieldfare/contracts'
import type { DayRange } from '../../months/closed-months.repository.ts'
import type { LicenceTerms } from './stations.repository.ts'

const DAY_MS = 86_400_000

function shift(day: LocalDate, days: number): LocalDate {
  return localDateSchema.parse(new Date(Date.parse(day) + days * DAY_MS).toISOString().slice(0, 10))
}

function rangeOf(terms: LicenceTerms): DayRange {
  return { from: terms.validFrom, to: terms.validTo }
}

/** Days of `whole` before and after `part`. */
function without(whole: DayRange, part: DayRange): DayRange[] {
  const overlaps = (part.to === null || whole.from <= part.to) && (whole.to === null || part.from <= whole.to)
  if (!overlaps) return [whole]
  const ranges: DayRange[] = []
  if (whole.from < part.from) ranges.push({ from: whole.from, to: shift(part.from, -1) })
  if (part.to !== null && (whole.to === null || whole.to > part.to)) {
    ranges.push({ from: shift(part.to, 1), to: whole.to })
  }
  return ranges
}

/** The days on which the station would pay something else than before: none where a licence stays as it was. */
export function changedDays(before: LicenceTerms | null, after: LicenceTerms): DayRange[] {
  if (before === null) return [rangeOf(after)]
  const isSamePrice =
    before.monthlyFeeMinor === after.monthlyFeeMinor && before.worksPartPpm === after.worksPartPpm
  if (!isSamePrice) return [rangeOf(before), rangeOf(after)]
  return [...without(rangeOf(before), rangeOf(after)), ...without(rangeOf(after), rangeOf(before))]
}
