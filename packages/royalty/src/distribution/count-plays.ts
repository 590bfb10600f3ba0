import { groupBy } from '../group-by.ts'
import { type DistributionInput, type DistributionRules, type PlayInput } from './input.ts'

/** A play that counts, with the milliseconds it counts for. */
export type CountedPlay = PlayInput & { readonly countedMs: bigint }

/** The plays of one station, sorted out by the society's rules. */
export type StationPlays = { readonly counted: readonly CountedPlay[]; readonly belowMinimum: number }

/** Milliseconds are whole numbers, so that weights can be added and compared exactly. */
function toMilliseconds(seconds: number): bigint {
  return BigInt(Math.round(seconds * 1000))
}

/** Applies the minimum length and the cap to every play, by station. A play of no length never counts. */
export function countPlays(input: DistributionInput): ReadonlyMap<string, StationPlays> {
  const byStation = groupBy(input.plays, ({ stationId }) => stationId)
  return new Map([...byStation].map(([stationId, plays]) => [stationId, applyRules(plays, input.rules)]))
}

function applyRules(plays: readonly PlayInput[], rules: DistributionRules): StationPlays {
  const minimumMs = toMilliseconds(rules.minimumSeconds)
  const capMs = rules.capSecondsPerPlay === null ? null : toMilliseconds(rules.capSecondsPerPlay)
  const counted: CountedPlay[] = []
  for (const play of plays) {
    const lengthMs = toMilliseconds(play.creditedSeconds)
    if (lengthMs === 0n || lengthMs < minimumMs) continue
    counted.push({ ...play, countedMs: capMs !== null && lengthMs > capMs ? capMs : lengthMs })
  }
  return { counted, belowMinimum: plays.length - counted.length }
}
