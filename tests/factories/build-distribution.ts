import { createHash, randomUUID } from 'node:crypto'
import {
  distributionIdSchema,
  statementIdSchema,
  type DistributionId,
  type StatementId,
  type UserId,
} from '@fieldfare/contracts'
import {
  inTransaction,
  saveDistributionResult,
  type Database,
  type DistributionResult,
} from '@fieldfare/database'
import type { BuiltParty, BuiltRecording } from './build-catalogue.ts'
import type { BuiltPlay } from './build-play.ts'
import type { BuiltStation } from './build-station.ts'
import { inserted, nextNumber } from './unique.ts'

export type DistributionSettings = {
  /** YYYY-MM. */
  month: string
  requestedBy: UserId
  station: BuiltStation
  recording: BuiltRecording
  play: BuiltPlay
  /** Each gets an equal line of 300 minor units in the recording. */
  parties: readonly BuiltParty[]
}

export type BuiltDistribution = {
  id: DistributionId
  digest: string
  /** In the order of the parties. */
  statements: { id: StatementId; number: string }[]
}

const administration = { code: 'administration', label: 'Administration', ratePpm: 100_000 }
const LINE_MINOR = 300n
const HELD_BACK_MINOR = 100n
const ADMINISTRATION_MINOR = 200n

/**
 * A calculated run of one station, one recording and one play: 300 minor units to each party, 100 held back, 200
 * deducted before, so that fee = 200 + 300 × parties + 100.
 */
export async function buildDistribution(
  database: Database,
  settings: DistributionSettings,
): Promise<BuiltDistribution> {
  const firstDay = `${settings.month}-01`
  await database('distribution_months').insert({ month: firstDay }).onConflict('month').ignore()
  await database('distribution_months').where({ month: firstDay }).update({ status: 'calculating' })
  const rows: { id: string }[] = await database('distributions')
    .insert({
      month: firstDay,
      run: database.raw('(select coalesce(max(run), 0) + 1 from distributions where month = ?)', [firstDay]),
      rules_version: '1',
      currency: 'EUR',
      currency_digits: 2,
      requested_by: settings.requestedBy,
    })
    .returning('id')
  const id = distributionIdSchema.parse(inserted(rows).id)
  const result = calculatedResult(settings)
  await inTransaction(database, (trx) => saveDistributionResult(trx, { id, month: firstDay }, result))
  return {
    id,
    digest: result.digest,
    statements: result.statements.map((statement) => ({
      id: statementIdSchema.parse(statement.id),
      number: statement.number,
    })),
  }
}

function calculatedResult(settings: DistributionSettings): DistributionResult {
  const allocatedMinor = LINE_MINOR * BigInt(settings.parties.length)
  const netMinor = allocatedMinor + HELD_BACK_MINOR
  const stationId = settings.station.id
  const holdbackId = randomUUID()
  return {
    digest: createHash('sha256').update(randomUUID()).digest('hex'),
    feeMinor: netMinor + ADMINISTRATION_MINOR,
    netMinor,
    allocatedMinor,
    heldBackMinor: HELD_BACK_MINOR,
    plays: 1,
    stations: [
      {
        stationId,
        heldMs: 3_600_000,
        expectedMs: 7_200_000,
        coveredDays: 31,
        feeMinor: netMinor + ADMINISTRATION_MINOR,
        netMinor,
        deductions: [{ ...administration, amountMinor: ADMINISTRATION_MINOR }],
        pools: [
          {
            right: 'recordings',
            poolMinor: netMinor,
            plays: 1,
            creditedMs: 180_000n,
            allocatedMinor,
            heldBackMinor: HELD_BACK_MINOR,
          },
        ],
      },
    ],
    holdbacks: [
      {
        id: holdbackId,
        stationId,
        right: 'recordings',
        workId: null,
        recordingId: settings.recording.id,
        subject: settings.recording.title,
        reasonCode: 'shares-incomplete',
        reason: 'The registered shares come to less than 100 %.',
        amountMinor: HELD_BACK_MINOR,
      },
    ],
    statements: settings.parties.map((party) => statementOf(settings, party, holdbackId)),
  }
}

function statementOf(
  settings: DistributionSettings,
  party: BuiltParty,
  holdbackId: string,
): DistributionResult['statements'][number] {
  const { station, recording, play } = settings
  return {
    id: randomUUID(),
    partyId: party.id,
    partyName: party.name,
    partyIpi: null,
    number: `${settings.month}-${String(nextNumber()).padStart(4, '0')}`,
    grossMinor: LINE_MINOR + 50n,
    netMinor: LINE_MINOR,
    deductions: [{ ...administration, amountMinor: 50n }],
    stations: [
      {
        stationId: station.id,
        grossMinor: LINE_MINOR + 50n,
        deductionsMinor: 50n,
        netMinor: LINE_MINOR,
        heldMs: 3_600_000,
        expectedMs: 7_200_000,
      },
    ],
    lines: [
      {
        right: 'recordings',
        stationId: station.id,
        workId: null,
        recordingId: recording.id,
        title: recording.title,
        artist: recording.artist,
        code: recording.isrc,
        plays: [{ playId: play.id, creditedMs: 180_000n }],
        creditedMs: 180_000n,
        sharePpm: 400_000,
        amountMinor: LINE_MINOR,
      },
    ],
    holdbackIds: [holdbackId],
  }
}

/** Lets a calculated run have been approved and issued, as clerk and worker do it. */
export async function issueDistribution(
  database: Database,
  run: BuiltDistribution,
  approvedBy: UserId,
): Promise<void> {
  await database('distributions').where({ id: run.id }).update({
    status: 'issued',
    approved_by: approvedBy,
    approved_at: database.fn.now(),
    issued_by: approvedBy,
    issued_at: database.fn.now(),
  })
  await database('distribution_months')
    .whereIn('month', database('distributions').where({ id: run.id }).select('month'))
    .update({ status: 'issued' })
}
