import type {
  EndpointResult,
  getDistribution,
  listDistributions,
  Month,
  MonthStatus,
} from '@fieldfare/contracts'
import { readSociety, type Actor, type Connection } from '@fieldfare/database'
import type { Dependencies } from '../../http/dependencies.ts'
import { readCoverage } from '../../records/coverage.repository.ts'
import { readMonthStatus } from '../../records/month.repository.ts'
import { daysOfMonth } from '../../records/months.ts'
import { cautionsFor } from './cautions.ts'
import { readRunParts, type RunParts } from './distribution-parts.repository.ts'
import { findRun, listDistributionMonths, listRuns, type RunRow } from './distribution-state.repository.ts'
import { approveMonth, calculateMonth, issueMonth, reopenMonth } from './distribution-steps.service.ts'
import { presentDistribution, presentSummary } from './distribution.presenter.ts'
import { refuseApproval, refuseCalculation, refuseIssue, refuseReopening } from './distributions.policy.ts'
import { readMonthState } from './month-state.ts'
import { countUnreadyLogs, countUnsettled } from './readiness.repository.ts'

type View = EndpointResult<typeof getDistribution>

const noParts: RunParts = { stations: [], deductions: [], pools: [], holdbacks: [], payees: [] }

/** A run has parts once its calculation has ended well. */
async function partsOf(connection: Connection, run: RunRow | null): Promise<RunParts> {
  return run === null || run.digest === null ? noParts : readRunParts(connection, run.id)
}

export function createDistributionsService(dependencies: Dependencies) {
  const { database, clock } = dependencies

  async function readCautions(month: Month, status: MonthStatus): Promise<string[]> {
    if (status === 'issuing' || status === 'issued') return []
    const days = daysOfMonth(month)
    return cautionsFor({
      coverage: await readCoverage(database, { kind: 'all' }, days, clock()),
      logs: await countUnreadyLogs(database, days),
      unsettled: await countUnsettled(database, days),
    })
  }

  async function view(actor: Actor, month: Month): Promise<View> {
    const [society, status, run] = await Promise.all([
      readSociety(database),
      readMonthStatus(database, month),
      findRun(database, month),
    ])
    const state = await readMonthState(database, { month, status, run }, clock())
    return presentDistribution({
      month,
      status,
      currency: society.currency,
      run,
      failure: run?.failure ?? state.issueFailure,
      parts: await partsOf(database, run),
      cautions: await readCautions(month, status),
      steps: {
        calculate: refuseCalculation(state, actor),
        approve: refuseApproval(state, actor),
        issue: refuseIssue(state, actor),
        reopen: refuseReopening(state, actor),
      },
    })
  }

  return {
    async list(): Promise<EndpointResult<typeof listDistributions>> {
      const society = await readSociety(database)
      const runs = new Map((await listRuns(database)).map((run) => [run.month, run]))
      const months = await listDistributionMonths(database)
      return {
        items: months.map(({ month, status }) =>
          presentSummary(month, status, runs.get(month) ?? null, society.currency),
        ),
      }
    },
    view,
    async calculate(actor: Actor, month: Month): Promise<View> {
      await calculateMonth(dependencies, actor, month)
      return view(actor, month)
    },
    async approve(actor: Actor, month: Month, digest: string): Promise<View> {
      await approveMonth(dependencies, actor, month, digest)
      return view(actor, month)
    },
    async issue(actor: Actor, month: Month): Promise<View> {
      await issueMonth(dependencies, actor, month)
      return view(actor, month)
    },
    async reopen(actor: Actor, month: Month, reason: string): Promise<View> {
      await reopenMonth(dependencies, actor, month, reason)
      return view(actor, month)
    },
  }
}
