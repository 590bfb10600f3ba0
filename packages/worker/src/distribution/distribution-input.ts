import { monthSchema } from '@fieldfare/contracts'
import {
  listDeductionRules,
  listMonthLicences,
  listMonthPlays,
  listMonthShares,
  type DistributionRun,
  type MonthLicence,
  type MonthShare,
  type Transaction,
} from '@fieldfare/database'
import type { DistributionInput, ShareInput } from '@fieldfare/royalty'
import { JobRefused } from '../jobs/job-context.ts'

function asShare(share: MonthShare): ShareInput {
  const { partyId, sharePpm, validFrom, validTo } = share
  const validity = { partyId, sharePpm, validFrom, validTo }
  if (share.workId !== null) return { right: 'works', subjectId: share.workId, ...validity }
  if (share.recordingId !== null) return { right: 'recordings', subjectId: share.recordingId, ...validity }
  throw new Error('A share is in a work or in a recording')
}

/** One licence a station and month is what can be calculated now; a change in mid-month is refused by name. */
function assertOneLicencePerStation(licences: readonly MonthLicence[]): void {
  const seen = new Set<string>()
  for (const { stationId, stationName } of licences) {
    if (seen.has(stationId))
      throw new JobRefused(
        `${stationName} has two licences within this month. Let one licence cover the month, then calculate again.`,
      )
    seen.add(stationId)
  }
}

/** Everything the month's money depends on, read in one transaction so that it fits together. */
export async function readDistributionInput(
  trx: Transaction,
  run: DistributionRun,
): Promise<DistributionInput> {
  const licences = await listMonthLicences(trx, run.month)
  assertOneLicencePerStation(licences)
  const plays = await listMonthPlays(trx, run.month)
  return {
    month: monthSchema.parse(run.month.slice(0, 7)),
    currency: run.currency,
    rules: {
      version: run.rulesVersion,
      minimumSeconds: run.minimumMs / 1000,
      capSecondsPerPlay: run.capMs === null ? null : run.capMs / 1000,
    },
    deductions: await listDeductionRules(trx, run.rulesVersion),
    licences: licences.map(({ stationName: _name, ...licence }) => licence),
    plays: plays.map((play) => ({
      playId: play.id,
      stationId: play.stationId,
      recordingId: play.recordingId,
      workId: play.workId,
      localDate: play.localDay,
      creditedSeconds: play.creditedMs / 1000,
    })),
    shares: (await listMonthShares(trx, run.month)).map(asShare),
  }
}
