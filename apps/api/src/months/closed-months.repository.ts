import type { LocalDate, Month, MonthStatus } from '@fieldfare/contracts'
import type { Transaction } from '@fieldfare/database'

export type DayRange = { from: LocalDate; to: LocalDate | null }

/** The first month, of those not open, that has a day in any of the ranges. Keeps those months as they are meanwhile. */
export async function findClosedMonthWithin(
  trx: Transaction,
  ranges: readonly DayRange[],
): Promise<{ month: Month; status: MonthStatus } | null> {
  if (ranges.length === 0) return null
  const row: { month: Month; status: MonthStatus } | undefined = await trx('distribution_months')
    .whereNot({ status: 'open' })
    .andWhere((touched) => {
      for (const { from, to } of ranges) {
        touched.orWhereRaw("daterange(month, (month + interval '1 month')::date) && daterange(?, ?, '[]')", [
          from,
          to,
        ])
      }
    })
    .orderBy('distribution_months.month')
    .forShare()
    .first(trx.raw("to_char(distribution_months.month, 'YYYY-MM') as month"), 'status')
  return row ?? null
}
