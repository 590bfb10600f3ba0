import { type Month, monthSchema, type MonthStatus } from '@fieldfare/contracts'
import type { Connection, Transaction } from '@fieldfare/database'
import { daysOfMonth } from './months.ts'

/** The month a local day belongs to. */
export function monthOfDay(localDay: string): Month {
  return monthSchema.parse(localDay.slice(0, 7))
}

/** Months nobody has calculated yet have no row and are open. */
export async function readMonthStatus(connection: Connection, month: Month): Promise<MonthStatus> {
  const row: { status: MonthStatus } | undefined = await connection('distribution_months')
    .where({ month: daysOfMonth(month).firstDay })
    .first('status')
  return row?.status ?? 'open'
}

/**
 * Keeps the month's status as it is until the transaction ends: others may read along, nobody may begin to
 * calculate. The row is made first where there is none, since what does not exist cannot be locked.
 */
export async function holdMonthStatus(trx: Transaction, month: Month): Promise<MonthStatus> {
  const { firstDay } = daysOfMonth(month)
  await trx('distribution_months').insert({ month: firstDay }).onConflict('month').ignore()
  const row: { status: MonthStatus } | undefined = await trx('distribution_months')
    .where({ month: firstDay })
    .forShare()
    .first('status')
  return row?.status ?? 'open'
}
