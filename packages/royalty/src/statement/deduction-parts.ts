import { allocate } from '../apportionment/allocate.ts'
import { type Distribution, type StationDistribution } from '../distribution/distribution.ts'
import { type DeductionLine } from '../fees/apply-deductions.ts'

/** Not an identifier, so no party can be mistaken for it; sorts after every party, so parties win ties. */
const HELD_BACK = '~held back'

/** The deductions behind what a party received from a station, by name; empty where it received nothing. */
export type DeductionParts = (stationId: string, partyId: string) => readonly DeductionLine[]

/**
 * Divides each deduction of each station over everyone its net fee went to, in proportion to what they got, by
 * largest remainder; what was held back bears its part too. So the parts of a deduction sum to the deduction.
 */
export function deductionParts(distribution: Distribution): DeductionParts {
  const netByStation = new Map<string, Map<string, bigint>>()
  const add = (stationId: string, key: string, amountMinor: bigint): void => {
    const net = netByStation.get(stationId) ?? new Map<string, bigint>()
    net.set(key, (net.get(key) ?? 0n) + amountMinor)
    netByStation.set(stationId, net)
  }
  for (const { stationId, partyId, amountMinor } of distribution.lines) add(stationId, partyId, amountMinor)
  for (const { stationId, amountMinor } of distribution.holdbacks) add(stationId, HELD_BACK, amountMinor)
  const parts = new Map(
    distribution.stations.map((station) => [
      station.stationId,
      divideDeductions(station, netByStation.get(station.stationId) ?? new Map<string, bigint>()),
    ]),
  )
  return (stationId, partyId) =>
    (parts.get(stationId) ?? []).map(({ line, amounts }) => ({
      ...line,
      amountMinor: amounts.get(partyId) ?? 0n,
    }))
}

type DividedDeduction = { line: DeductionLine; amounts: ReadonlyMap<string, bigint> }

function divideDeductions(
  station: StationDistribution,
  net: ReadonlyMap<string, bigint>,
): readonly DividedDeduction[] {
  const weights = [...net].map(([key, weight]) => ({ key, weight }))
  return station.deductions.map((line) => ({
    line,
    // Where the deductions took the whole fee nobody received anything, and nobody's statement shows a part.
    amounts: station.netMinor > 0n ? allocate(line.amountMinor, weights) : new Map<string, bigint>(),
  }))
}
