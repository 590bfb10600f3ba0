import { allocate } from '../apportionment/allocate.ts'
import { compareText } from '../compare-text.ts'
import { applyDeductions, type DeductionLine, WHOLE_PPM } from '../fees/apply-deductions.ts'
import { proRataByDays } from '../fees/pro-rata-by-days.ts'
import { sumOf } from '../group-by.ts'
import { checkInput } from './check-input.ts'
import { countPlays, type StationPlays } from './count-plays.ts'
import {
  type Distribution,
  type DistributionTotals,
  type Pool,
  type StationDistribution,
} from './distribution.ts'
import { type DividedPool, dividePool } from './divide-pool.ts'
import { type DistributionInput, type LicenceInput, type Right } from './input.ts'
import { type ShareTerms, shareTermsFor } from './share-terms.ts'

type DividedStation = { station: StationDistribution; pools: readonly DividedPool[] }

const RIGHTS = ['works', 'recordings'] as const satisfies readonly Right[]
const NO_PLAYS: StationPlays = { counted: [], belowMinimum: 0 }

/**
 * Divides a month's licence fees down to every party's amount from every work and recording. Each level is divided
 * from the rounded amount of the level above by largest remainder, so every level sums to the one above to the unit:
 * fee → deductions and net → a pool per right → subjects by counted time → parties by share, or a named holdback.
 *
 * Costs time and memory in proportion to the number of plays.
 *
 * @throws RoyaltyError `invalid-input` or `unknown-currency` when the input breaks a stated condition
 */
export function calculateDistribution(input: DistributionInput): Distribution {
  checkInput(input)
  const playsByStation = countPlays(input)
  const terms = {
    works: shareTermsFor('works', input.shares),
    recordings: shareTermsFor('recordings', input.shares),
  }
  const divided = input.licences
    .toSorted((left, right) => compareText(left.stationId, right.stationId))
    .map((licence) => divideStation(input, licence, playsByStation.get(licence.stationId) ?? NO_PLAYS, terms))
  const stations = divided.map(({ station }) => station)
  const pools = divided.flatMap((station) => station.pools)
  const licensed = new Set(stations.map(({ stationId }) => stationId))
  const playIdsWithoutLicence = input.plays
    .filter(({ stationId }) => !licensed.has(stationId))
    .map(({ playId }) => playId)
    .sort(compareText)
  const { month, currency } = input
  const { minimumSeconds, capSecondsPerPlay, version } = input.rules
  const lines = pools.flatMap((pool) => pool.lines)
  const holdbacks = pools.flatMap((pool) => pool.holdbacks)
  return {
    month,
    currency,
    rules: { minimumSeconds, capSecondsPerPlay, version },
    stations,
    lines,
    holdbacks,
    playIdsWithoutLicence,
    totals: {
      ...stationTotals(input, stations),
      attributedMinor: sumOf(lines, ({ amountMinor }) => amountMinor),
      heldBackMinor: sumOf(holdbacks, ({ amountMinor }) => amountMinor),
      playsWithoutLicence: playIdsWithoutLicence.length,
    },
  }
}

function divideStation(
  input: DistributionInput,
  licence: LicenceInput,
  plays: StationPlays,
  terms: Record<Right, ShareTerms>,
): DividedStation {
  const { stationId, monthlyFeeMinor, coveredDays, daysInMonth, worksPartPpm } = licence
  const feeMinor = proRataByDays(monthlyFeeMinor, coveredDays, daysInMonth)
  const { deductions, netMinor } = applyDeductions(feeMinor, input.deductions)
  const parts = new Map([
    ['works', worksPartPpm],
    ['recordings', WHOLE_PPM - worksPartPpm],
  ])
  const amounts = allocate(
    netMinor,
    [...parts].map(([key, ppm]) => ({ key, weight: BigInt(ppm) })),
  )
  // A right the licence does not pay for has no pool, rather than a pool of nothing.
  const pools = RIGHTS.filter((right) => (parts.get(right) ?? 0) > 0).map((right) =>
    dividePool({
      stationId,
      right,
      amountMinor: amounts.get(right) ?? 0n,
      plays: plays.counted,
      terms: terms[right],
    }),
  )
  const station: StationDistribution = {
    stationId,
    monthlyFeeMinor,
    coveredDays,
    daysInMonth,
    feeMinor,
    deductions,
    netMinor,
    worksPartPpm,
    pools: pools.map(({ pool }) => pool),
    heldSeconds: licence.heldSeconds,
    expectedSeconds: licence.expectedSeconds,
    playsCounted: plays.counted.length,
    playsBelowMinimum: plays.belowMinimum,
  }
  return { station, pools }
}

type StationTotals = Omit<DistributionTotals, 'attributedMinor' | 'heldBackMinor' | 'playsWithoutLicence'>

function stationTotals(input: DistributionInput, stations: readonly StationDistribution[]): StationTotals {
  const pools = stations.flatMap((station) => station.pools)
  return {
    feeMinor: sumOf(stations, ({ feeMinor }) => feeMinor),
    deductions: totalDeductions(input, stations),
    netMinor: sumOf(stations, ({ netMinor }) => netMinor),
    worksMinor: poolTotal(pools, 'works'),
    recordingsMinor: poolTotal(pools, 'recordings'),
    playsCounted: stations.reduce((sum, { playsCounted }) => sum + playsCounted, 0),
    playsBelowMinimum: stations.reduce((sum, { playsBelowMinimum }) => sum + playsBelowMinimum, 0),
  }
}

function totalDeductions(
  input: DistributionInput,
  stations: readonly StationDistribution[],
): readonly DeductionLine[] {
  const taken = stations.flatMap(({ deductions }) => deductions)
  return input.deductions
    .toSorted((left, right) => compareText(left.code, right.code))
    .map(({ code, label, ratePpm }) => ({
      code,
      label,
      ratePpm,
      amountMinor: sumOf(
        taken.filter((line) => line.code === code),
        ({ amountMinor }) => amountMinor,
      ),
    }))
}

function poolTotal(pools: readonly Pool[], right: Right): bigint {
  return sumOf(
    pools.filter((pool) => pool.right === right),
    ({ amountMinor }) => amountMinor,
  )
}
