import { monthSchema } from '@fieldfare/contracts'
import {
  listPayees,
  lockDistributionRun,
  markDistributionFailed,
  readStationNames,
  readSubjectNames,
  saveDistributionResult,
  type DistributionRun,
  type Transaction,
} from '@fieldfare/database'
import {
  assertClosed,
  buildStatements,
  calculateDistribution,
  serialiseDistribution,
  type DistributionInput,
} from '@fieldfare/royalty'
import { createHash } from 'node:crypto'
import { readDistributionInput } from '../distribution/distribution-input.ts'
import { describeDistribution } from '../distribution/distribution-result.ts'
import type { JobHandler } from './job-context.ts'

async function readNames(trx: Transaction, input: DistributionInput) {
  return {
    subjects: await readSubjectNames(trx, {
      workIds: [...new Set(input.plays.flatMap(({ workId }) => workId ?? []))],
      recordingIds: [...new Set(input.plays.map(({ recordingId }) => recordingId))],
    }),
    stations: await readStationNames(trx),
  }
}

async function calculate(trx: Transaction, run: DistributionRun): Promise<void> {
  const input = await readDistributionInput(trx, run)
  const distribution = calculateDistribution(input)
  assertClosed(distribution)
  const partyIds = [...new Set(input.shares.map(({ partyId }) => partyId))]
  const payees = (await listPayees(trx, partyIds)).map(({ id, name, ipi }) => ({
    partyId: id,
    name,
    ipiNameNumber: ipi,
  }))
  const digest = createHash('sha256').update(serialiseDistribution(distribution)).digest('hex')
  const result = describeDistribution({
    run,
    input,
    distribution,
    statements: buildStatements(distribution, payees),
    names: await readNames(trx, input),
    digest,
  })
  await saveDistributionResult(trx, run, result)
}

/** Calculates a month from its plays, licences and shares, and writes every level of it. */
export const calculateDistributionJob: JobHandler<'calculate-distribution'> = {
  async run({ finish, tell }, { distributionId }) {
    const months: string[] = []
    await finish(async (trx) => {
      const run = await lockDistributionRun(trx, distributionId)
      // A run that was withdrawn meanwhile, or is done, is left as it is.
      if (run?.status !== 'calculating') return
      await calculate(trx, run)
      months.push(run.month.slice(0, 7))
    })
    for (const month of months) {
      await tell({
        kind: 'distribution-progress',
        month: monthSchema.parse(month),
        status: 'calculated',
        done: 1,
        total: 1,
      })
    }
  },
  onFailure: (trx, { distributionId }, reason) => markDistributionFailed(trx, distributionId, reason),
}
