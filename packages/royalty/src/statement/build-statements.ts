import { compareText } from '../compare-text.ts'
import {
  type Distribution,
  type DistributionLine,
  type Holdback,
  type StationDistribution,
} from '../distribution/distribution.ts'
import { type Right } from '../distribution/input.ts'
import { type DeductionLine } from '../fees/apply-deductions.ts'
import { groupBy, sumOf } from '../group-by.ts'
import { RoyaltyError } from '../royalty-error.ts'
import { type DeductionParts, deductionParts } from './deduction-parts.ts'
import { type Payee, type RightsAmount, type Statement, type StatementStation } from './statement.ts'

/**
 * A statement for every payee with a line in the distribution, or with a share in something held back, in ascending
 * order of the party.
 *
 * @throws RoyaltyError `unknown-payee` when a line belongs to a party that is not among the payees: its money must
 * not be left without a statement
 */
export function buildStatements(distribution: Distribution, payees: readonly Payee[]): readonly Statement[] {
  const known = new Map(payees.map((payee) => [payee.partyId, payee]))
  const linesByParty = groupBy(distribution.lines, ({ partyId }) => partyId)
  for (const partyId of linesByParty.keys()) {
    if (!known.has(partyId)) {
      throw new RoyaltyError('unknown-payee', `Party ${partyId} earned an amount but is not a payee.`)
    }
  }
  const holdbacksByParty = holdbacksByClaimant(distribution.holdbacks)
  const parts = deductionParts(distribution)
  return [...known.values()]
    .sort((left, right) => compareText(left.partyId, right.partyId))
    .map((payee) => {
      const lines = linesByParty.get(payee.partyId) ?? []
      const holdbacks = holdbacksByParty.get(payee.partyId) ?? []
      return buildStatement(distribution, payee, { lines, holdbacks }, parts)
    })
    .filter(({ lines, holdbacks }) => lines.length > 0 || holdbacks.length > 0)
}

type PayeeEntries = { lines: readonly DistributionLine[]; holdbacks: readonly Holdback[] }

function buildStatement(
  distribution: Distribution,
  payee: Payee,
  { lines, holdbacks }: PayeeEntries,
  parts: DeductionParts,
): Statement {
  const linesByStation = groupBy(lines, ({ stationId }) => stationId)
  const stations = distribution.stations
    .filter(({ stationId }) => linesByStation.has(stationId))
    .map((station) =>
      buildStation(
        station,
        linesByStation.get(station.stationId) ?? [],
        parts(station.stationId, payee.partyId),
      ),
    )
  return {
    payee,
    month: distribution.month,
    currency: distribution.currency,
    ruleVersion: distribution.rules.version,
    grossMinor: sumOf(stations, ({ grossMinor }) => grossMinor),
    deductions: addDeductions(distribution, stations),
    netMinor: sumOf(stations, ({ netMinor }) => netMinor),
    ...amountsByRight(lines),
    stations,
    lines,
    holdbacks,
  }
}

function buildStation(
  station: StationDistribution,
  lines: readonly DistributionLine[],
  deductions: readonly DeductionLine[],
): StatementStation {
  const { stationId, heldSeconds, expectedSeconds } = station
  const netMinor = sumOf(lines, ({ amountMinor }) => amountMinor)
  return {
    stationId,
    grossMinor: netMinor + sumOf(deductions, ({ amountMinor }) => amountMinor),
    deductions,
    netMinor,
    ...amountsByRight(lines),
    heldSeconds,
    expectedSeconds,
  }
}

function addDeductions(
  distribution: Distribution,
  stations: readonly StatementStation[],
): readonly DeductionLine[] {
  const taken = stations.flatMap(({ deductions }) => deductions)
  return distribution.totals.deductions.map((total) => ({
    ...total,
    amountMinor: sumOf(taken, (line) => (line.code === total.code ? line.amountMinor : 0n)),
  }))
}

function amountsByRight(lines: readonly DistributionLine[]): RightsAmount {
  const amountOf = (right: Right): bigint =>
    sumOf(lines, (line) => (line.right === right ? line.amountMinor : 0n))
  return { worksMinor: amountOf('works'), recordingsMinor: amountOf('recordings') }
}

function holdbacksByClaimant(holdbacks: readonly Holdback[]): ReadonlyMap<string, readonly Holdback[]> {
  const claims = holdbacks.flatMap((holdback) =>
    holdback.claimantPartyIds.map((partyId) => ({ partyId, holdback })),
  )
  const byParty = groupBy(claims, ({ partyId }) => partyId)
  return new Map([...byParty].map(([partyId, own]) => [partyId, own.map(({ holdback }) => holdback)]))
}
