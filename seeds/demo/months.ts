import { DateTime } from 'luxon'

/** The demo lives in the two calendar months before the present one. */
export type DemoMonths = {
  /** Complete, distributed, statements issued. */
  history: DateTime<true>
  /** What the desk works on now: logs come in, nothing is calculated. */
  current: DateTime<true>
}

export function demoMonths(now: Date): DemoMonths {
  const thisMonth = DateTime.fromJSDate(now, { zone: 'Europe/Lisbon' }).startOf('month')
  const month = (monthsAgo: number) =>
    DateTime.utc(thisMonth.year, thisMonth.month).minus({ months: monthsAgo })
  const [history, current] = [month(2), month(1)]
  if (!history.isValid || !current.isValid) throw new Error('The clock of this machine shows no date')
  return { history, current }
}
