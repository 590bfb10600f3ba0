import type { DistributionId, PartyId, Right } from '@fieldfare/contracts'
import type { Transaction } from '../connection.ts'

export type NamedDeduction = { code: string; label: string; ratePpm: number; amountMinor: bigint }

/** The work or the recording a line or a holdback is about; neither for a whole pool. */
export type SubjectReference = { workId: string | null; recordingId: string | null }

export type StationResult = {
  stationId: string
  heldMs: number
  expectedMs: number
  coveredDays: number
  feeMinor: bigint
  netMinor: bigint
  deductions: readonly NamedDeduction[]
  pools: readonly {
    right: Right
    poolMinor: bigint
    plays: number
    creditedMs: bigint
    allocatedMinor: bigint
    heldBackMinor: bigint
  }[]
}

export type HoldbackResult = SubjectReference & {
  id: string
  stationId: string
  right: Right
  subject: string
  reasonCode: string
  reason: string
  amountMinor: bigint
}

export type StatementLineResult = SubjectReference & {
  right: Right
  stationId: string
  title: string
  artist: string
  code: string | null
  plays: readonly { playId: string; creditedMs: bigint }[]
  creditedMs: bigint
  sharePpm: number
  amountMinor: bigint
}

export type StatementResult = {
  id: string
  partyId: PartyId
  partyName: string
  partyIpi: string | null
  number: string
  grossMinor: bigint
  netMinor: bigint
  deductions: readonly NamedDeduction[]
  stations: readonly {
    stationId: string
    grossMinor: bigint
    deductionsMinor: bigint
    netMinor: bigint
    heldMs: number
    expectedMs: number
  }[]
  /** In the order in which they are numbered, from 1. */
  lines: readonly StatementLineResult[]
  holdbackIds: readonly string[]
}

export type DistributionResult = {
  digest: string
  feeMinor: bigint
  netMinor: bigint
  allocatedMinor: bigint
  heldBackMinor: bigint
  plays: number
  stations: readonly StationResult[]
  holdbacks: readonly HoldbackResult[]
  statements: readonly StatementResult[]
}

const ROWS_PER_INSERT = 500

async function insertAll(trx: Transaction, table: string, rows: readonly object[]): Promise<void> {
  if (rows.length > 0) await trx.batchInsert(table, [...rows], ROWS_PER_INSERT)
}

function deductionRows(deductions: readonly NamedDeduction[], owner: object): object[] {
  return deductions.map((deduction, index) => ({
    ...owner,
    position: index + 1,
    code: deduction.code,
    label: deduction.label,
    rate_ppm: deduction.ratePpm,
    amount_minor: deduction.amountMinor,
  }))
}

async function insertStations(
  trx: Transaction,
  distributionId: DistributionId,
  stations: readonly StationResult[],
): Promise<void> {
  const ownerOf = (station: StationResult) => ({
    distribution_id: distributionId,
    station_id: station.stationId,
  })
  await insertAll(
    trx,
    'distribution_stations',
    stations.map((station) => ({
      ...ownerOf(station),
      held_ms: station.heldMs,
      expected_ms: station.expectedMs,
      covered_days: station.coveredDays,
      fee_minor: station.feeMinor,
      net_minor: station.netMinor,
    })),
  )
  await insertAll(
    trx,
    'distribution_deductions',
    stations.flatMap((station) => deductionRows(station.deductions, ownerOf(station))),
  )
  await insertAll(
    trx,
    'distribution_pools',
    stations.flatMap((station) =>
      station.pools.map((pool) => ({
        ...ownerOf(station),
        right: pool.right,
        pool_minor: pool.poolMinor,
        plays: pool.plays,
        credited_ms: pool.creditedMs,
        allocated_minor: pool.allocatedMinor,
        held_back_minor: pool.heldBackMinor,
      })),
    ),
  )
}

async function insertHoldbacks(
  trx: Transaction,
  distributionId: DistributionId,
  holdbacks: readonly HoldbackResult[],
): Promise<void> {
  await insertAll(
    trx,
    'distribution_holdbacks',
    holdbacks.map((holdback) => ({
      id: holdback.id,
      distribution_id: distributionId,
      station_id: holdback.stationId,
      right: holdback.right,
      work_id: holdback.workId,
      recording_id: holdback.recordingId,
      subject: holdback.subject,
      reason_code: holdback.reasonCode,
      reason: holdback.reason,
      amount_minor: holdback.amountMinor,
    })),
  )
}

function lineRows(statement: StatementResult): object[] {
  return statement.lines.map((line, index) => ({
    statement_id: statement.id,
    line_number: index + 1,
    right: line.right,
    station_id: line.stationId,
    work_id: line.workId,
    recording_id: line.recordingId,
    title: line.title,
    artist: line.artist,
    code: line.code,
    plays: line.plays.length,
    credited_ms: line.creditedMs,
    share_ppm: line.sharePpm,
    amount_minor: line.amountMinor,
  }))
}

function linePlayRows(statement: StatementResult): object[] {
  return statement.lines.flatMap((line, index) =>
    line.plays.map((play) => ({
      statement_id: statement.id,
      line_number: index + 1,
      play_id: play.playId,
      credited_ms: play.creditedMs,
    })),
  )
}

function statementStationRows(statement: StatementResult): object[] {
  return statement.stations.map((station) => ({
    statement_id: statement.id,
    station_id: station.stationId,
    gross_minor: station.grossMinor,
    deductions_minor: station.deductionsMinor,
    net_minor: station.netMinor,
    held_ms: station.heldMs,
    expected_ms: station.expectedMs,
  }))
}

async function insertStatements(
  trx: Transaction,
  distributionId: DistributionId,
  statements: readonly StatementResult[],
): Promise<void> {
  await insertAll(
    trx,
    'statements',
    statements.map((statement) => ({
      id: statement.id,
      distribution_id: distributionId,
      party_id: statement.partyId,
      party_name: statement.partyName,
      party_ipi: statement.partyIpi,
      number: statement.number,
      gross_minor: statement.grossMinor,
      net_minor: statement.netMinor,
    })),
  )
  const deductions = statements.flatMap((statement) =>
    deductionRows(statement.deductions, { statement_id: statement.id }),
  )
  await insertAll(trx, 'statement_deductions', deductions)
  await insertAll(trx, 'statement_stations', statements.flatMap(statementStationRows))
  const holdbacks = statements.flatMap(({ id, holdbackIds }) =>
    holdbackIds.map((holdbackId) => ({ statement_id: id, holdback_id: holdbackId })),
  )
  await insertAll(trx, 'statement_holdbacks', holdbacks)
  await insertAll(trx, 'statement_lines', statements.flatMap(lineRows))
  await insertAll(trx, 'statement_line_plays', statements.flatMap(linePlayRows))
}

/** Writes every level of a calculated month and marks run and month as calculated, all in one transaction. */
export async function saveDistributionResult(
  trx: Transaction,
  run: { id: DistributionId; month: string },
  result: DistributionResult,
): Promise<void> {
  await insertStations(trx, run.id, result.stations)
  await insertHoldbacks(trx, run.id, result.holdbacks)
  await insertStatements(trx, run.id, result.statements)
  await trx('distributions').where({ id: run.id }).update({
    status: 'calculated',
    digest: result.digest,
    fee_minor: result.feeMinor,
    net_minor: result.netMinor,
    allocated_minor: result.allocatedMinor,
    held_back_minor: result.heldBackMinor,
    plays: result.plays,
    calculated_at: trx.fn.now(),
  })
  await trx('distribution_months').where({ month: run.month }).update({ status: 'calculated' })
}
