import type { Month, MonthStatus } from '@fieldfare/contracts'
import type { Connection } from '@fieldfare/database'
import { daysOfMonth } from '../../records/months.ts'
import { findIssueFailure, type RunRow } from './distribution-state.repository.ts'
import type { MonthState } from './distributions.policy.ts'
import { countUnreadyLogs, readMonthEnd } from './readiness.repository.ts'

/** Everything the steps of a month depend on, beside who asks. */
export async function readMonthState(
  connection: Connection,
  known: { month: Month; status: MonthStatus; run: RunRow | null },
  now: Date,
): Promise<MonthState & { run: RunRow | null }> {
  const { month, status, run } = known
  const days = daysOfMonth(month)
  const logs = await countUnreadyLogs(connection, days)
  return {
    status,
    run,
    isOver: new Date(await readMonthEnd(connection, days)) <= now,
    logsInWork: logs.inWork,
    issueFailure: run?.status === 'issuing' ? await findIssueFailure(connection, run.id) : null,
  }
}
