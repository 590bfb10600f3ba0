import type { LocalDate, Month, MonthStatus } from '@fieldfare/contracts'
import type { Connection, Transaction } from '@fieldfare/database'

/** A month nobody has closed yet has no row. */
export async function readMonthStatus(connection: Connection, month: Month): Promise<MonthStatus> {
  const row: { status: MonthStatus } | undefined = await connection('distribution_months')
    .where({ month: `${month}-01` })
    .first('status')
  return row?.status ?? 'open'
}

/** As {@link readMonthStatus}, and keeps it from changing until the transaction ends. */
export async function holdMonthStatus(trx: Transaction, month: Month): Promise<MonthStatus> {
  const row: { status: MonthStatus } | undefined = await trx('distribution_months')
    .where({ month: `${month}-01` })
    .forShare()
    .first('status')
  return row?.status ?? 'open'
}

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
    .orderBy('month')
    .forShare()
    .first(trx.raw("to_char(month, 'YYYY-MM') as month"), 'status')
  return row ?? null
}
