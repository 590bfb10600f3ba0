import type { DistributionId, Month } from '@fieldfare/contracts'
import {
  enqueueJob,
  inTransaction,
  readSociety,
  recordAudit,
  violates,
  type Actor,
  type Transaction,
} from '@fieldfare/database'
import { AppError, conflict } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { askAgain } from '../../records/job-retry.repository.ts'
import { monthInWords } from '../../records/months.ts'
import {
  approveRun,
  findRulesVersion,
  findRun,
  insertRun,
  issueJobKey,
  lockMonth,
  setMonthStatus,
  startIssuing,
  withdrawRun,
  type RunRow,
} from './distribution-state.repository.ts'
import {
  refuseApproval,
  refuseCalculation,
  refuseIssue,
  refuseReopening,
  type MonthState,
  type Refusal,
} from './distributions.policy.ts'
import { readMonthState } from './month-state.ts'

type LockedMonth = MonthState & { run: RunRow | null }
type Clock = Pick<Dependencies, 'database' | 'clock'>

function refuseIf(refusal: Refusal | null): void {
  if (refusal !== null) throw new AppError(refusal.code, { detail: refusal.reason })
}

/** Where the policy allowed a step there is a run; its absence would be a broken database, not a refusal. */
function standingRun(state: LockedMonth): RunRow {
  if (state.run === null) throw new Error('The month has a status without a run')
  return state.run
}

/** Of two people who take a step at once, the second finds the month as the first has left it. */
async function lock(trx: Transaction, month: Month, now: Date): Promise<LockedMonth> {
  const status = await lockMonth(trx, month)
  return readMonthState(trx, { month, status, run: await findRun(trx, month) }, now)
}

async function audit(
  trx: Transaction,
  actor: Actor,
  step: { action: string; distributionId: DistributionId; summary: string },
): Promise<void> {
  await recordAudit(trx, {
    actor,
    action: step.action,
    subjectKind: 'distribution',
    subjectId: step.distributionId,
    summary: step.summary,
  })
}

/** Withdraws what stands and asks a worker for a new run, all or nothing. */
export async function calculateMonth({ database, clock }: Clock, actor: Actor, month: Month): Promise<void> {
  await inTransaction(database, async (trx) => {
    refuseIf(refuseCalculation(await lock(trx, month, clock()), actor))
    const rulesVersion = await findRulesVersion(trx, month)
    if (rulesVersion === null) throw conflict('No distribution rules are valid in this month.')
    const { currency, currencyDigits } = await readSociety(trx)
    await withdrawRun(trx, month)
    await setMonthStatus(trx, month, 'calculating')
    const run = { month, rulesVersion, currency, currencyDigits, requestedBy: actor.userId }
    const distributionId = await insertRun(trx, run)
    await enqueueJob(trx, {
      kind: 'calculate-distribution',
      payload: { distributionId },
      dedupeKey: `calculate-distribution-${distributionId}`,
    })
    await audit(trx, actor, {
      action: 'calculate-distribution',
      distributionId,
      summary: `Asked for ${monthInWords(month)} to be calculated by rules ${rulesVersion}`,
    })
  })
}

async function approve(
  trx: Transaction,
  actor: Actor,
  approval: { month: Month; digest: string; now: Date },
): Promise<void> {
  const { month, digest } = approval
  const state = await lock(trx, month, approval.now)
  refuseIf(refuseApproval(state, actor))
  const run = standingRun(state)
  if (run.digest !== digest) {
    throw conflict('The month was calculated again since you looked. Load the page and check it anew.')
  }
  await approveRun(trx, run.id, actor.userId)
  await setMonthStatus(trx, month, 'approved')
  await audit(trx, actor, {
    action: 'approve-distribution',
    distributionId: run.id,
    summary: `Approved run ${run.run} of ${monthInWords(month)} with digest ${digest}`,
  })
}

/** The second pair of eyes; the database itself refuses the first pair. */
export async function approveMonth(
  { database, clock }: Clock,
  actor: Actor,
  month: Month,
  digest: string,
): Promise<void> {
  try {
    await inTransaction(database, (trx) => approve(trx, actor, { month, digest, now: clock() }))
  } catch (error) {
    if (!violates(error, 'distributions_four_eyes_check')) throw error
    throw new AppError('second-person-needed', {
      detail: 'You calculated this month yourself; another clerk must approve it.',
      cause: error,
    })
  }
}

/** Asks a worker to make the statements and, when all are made, to open them. */
export async function issueMonth({ database, clock }: Clock, actor: Actor, month: Month): Promise<void> {
  await inTransaction(database, async (trx) => {
    const state = await lock(trx, month, clock())
    refuseIf(refuseIssue(state, actor))
    const run = standingRun(state)
    await startIssuing(trx, run.id, actor.userId)
    await setMonthStatus(trx, month, 'issuing')
    await askAgain(trx, {
      kind: 'render-statements',
      payload: { distributionId: run.id },
      dedupeKey: issueJobKey(run.id),
    })
    await audit(trx, actor, {
      action: 'issue-distribution',
      distributionId: run.id,
      summary: `Asked for the statements of ${monthInWords(month)} to be made and issued`,
    })
  })
}

/** Withdraws what was calculated, so that plays of the month can change again. */
export async function reopenMonth(
  { database, clock }: Clock,
  actor: Actor,
  month: Month,
  reason: string,
): Promise<void> {
  await inTransaction(database, async (trx) => {
    const state = await lock(trx, month, clock())
    refuseIf(refuseReopening(state, actor))
    await withdrawRun(trx, month)
    await setMonthStatus(trx, month, 'open')
    await audit(trx, actor, {
      action: 'reopen-month',
      distributionId: standingRun(state).id,
      summary: `Returned ${monthInWords(month)} to open: ${reason}`,
    })
  })
}
