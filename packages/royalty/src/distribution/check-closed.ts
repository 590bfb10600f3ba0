import { WHOLE_PPM } from '../fees/apply-deductions.ts'
import { groupBy, sumOf } from '../group-by.ts'
import { RoyaltyError } from '../royalty-error.ts'
import {
  type Distribution,
  type DistributionLine,
  type Holdback,
  type Pool,
  type StationDistribution,
  type SubjectAmount,
  type SubjectKind,
} from './distribution.ts'
import { type Right } from './input.ts'

/** One sum that does not come to what it must. */
export type ClosureFault = { readonly where: string; readonly expected: bigint; readonly found: bigint }

type PlacedPart = (DistributionLine | Holdback) & { readonly place: string }

type Ledger = {
  readonly faults: ClosureFault[]
  readonly parts: ReadonlyMap<string, readonly PlacedPart[]>
}

/**
 * Adds up every level of a distribution again, from the parts alone, and lists each sum that does not come to the
 * level above. It also checks that no amount is negative and that none is a unit or more away from its exact quota.
 *
 * @returns the faults; none when the distribution is closed
 */
export function checkClosed(distribution: Distribution): readonly ClosureFault[] {
  const parts: readonly PlacedPart[] = [
    ...distribution.lines.map((line) => ({ ...line, place: placeOf(line, kindOf(line.right)) })),
    ...distribution.holdbacks.map((held) => ({ ...held, place: placeOf(held, held.subjectKind) })),
  ]
  const ledger: Ledger = { faults: [], parts: groupBy(parts, ({ place }) => place) }
  for (const station of distribution.stations) checkStation(ledger, station)
  for (const { place, amountMinor, plays, playIds } of parts) {
    if (amountMinor < 0n) fault(ledger, `${place}: sign`, 0n, amountMinor)
    expectSum(ledger, `${place}: plays listed`, BigInt(plays), BigInt(playIds.length))
  }
  checkTotals(ledger, distribution)
  return ledger.faults
}

/** @throws RoyaltyError `not-closed`, naming the first sums that are wrong */
export function assertClosed(distribution: Distribution): void {
  const faults = checkClosed(distribution)
  if (faults.length === 0) return
  const first = faults
    .slice(0, 5)
    .map(({ where, expected, found }) => `${where} (expected ${expected}, found ${found})`)
  throw new RoyaltyError('not-closed', `${faults.length} sums are not closed: ${first.join('; ')}`)
}

type Place = { readonly stationId: string; readonly right: Right; readonly subjectId: string | null }

function placeOf({ stationId, right, subjectId }: Place, kind: SubjectKind | null): string {
  return `${stationId} ${right} ${kind ?? 'whole'} ${subjectId ?? 'pool'}`
}

/** Lines are only ever paid for works from the pool for works, and for recordings from the pool for recordings. */
function kindOf(right: Right): SubjectKind {
  return right === 'works' ? 'work' : 'recording'
}

function fault(ledger: Ledger, where: string, expected: bigint, found: bigint): void {
  ledger.faults.push({ where, expected, found })
}

function expectSum(ledger: Ledger, where: string, expected: bigint, found: bigint): void {
  if (expected !== found) fault(ledger, where, expected, found)
}

/** An amount divided by largest remainder lies less than one unit from amount × weight ÷ total. */
function expectNearQuota(ledger: Ledger, where: string, part: bigint, quota: [bigint, bigint, bigint]): void {
  const [amount, weight, total] = quota
  const distance = part * total - amount * weight
  if (distance >= total || distance <= -total)
    fault(ledger, `${where}: quota`, (amount * weight) / total, part)
}

function checkStation(ledger: Ledger, station: StationDistribution): void {
  const { stationId, feeMinor, netMinor } = station
  const deducted = sumOf(station.deductions, ({ amountMinor }) => amountMinor)
  expectSum(ledger, `${stationId}: fee`, feeMinor, deducted + netMinor)
  expectSum(
    ledger,
    `${stationId}: net`,
    netMinor,
    sumOf(station.pools, ({ amountMinor }) => amountMinor),
  )
  const amounts = [feeMinor, netMinor, ...station.deductions.map(({ amountMinor }) => amountMinor)]
  for (const amount of amounts) if (amount < 0n) fault(ledger, `${stationId}: sign`, 0n, amount)
  for (const pool of station.pools) checkPool(ledger, stationId, pool)
}

function checkPool(ledger: Ledger, stationId: string, pool: Pool): void {
  const { right, amountMinor, weightedMs, subjects } = pool
  const place = `${stationId} ${right}`
  if (subjects.length === 0) {
    const held = ledger.parts.get(placeOf({ stationId, right, subjectId: null }, null)) ?? []
    expectSum(
      ledger,
      `${place}: pool held back`,
      amountMinor,
      sumOf(held, (part) => part.amountMinor),
    )
    return
  }
  expectSum(
    ledger,
    `${place}: pool`,
    amountMinor,
    sumOf(subjects, (subject) => subject.amountMinor),
  )
  expectSum(
    ledger,
    `${place}: weight`,
    weightedMs,
    sumOf(subjects, (subject) => subject.weightedMs),
  )
  for (const subject of subjects) {
    expectNearQuota(ledger, `${place} ${subject.subjectId}`, subject.amountMinor, [
      amountMinor,
      subject.weightedMs,
      weightedMs,
    ])
    checkSubject(
      ledger,
      placeOf({ stationId, right, subjectId: subject.subjectId }, subject.subjectKind),
      subject,
    )
  }
}

function checkSubject(ledger: Ledger, place: string, subject: SubjectAmount): void {
  const parts = ledger.parts.get(place) ?? []
  const weight = subject.weightedMs * BigInt(WHOLE_PPM)
  expectSum(
    ledger,
    place,
    subject.amountMinor,
    sumOf(parts, ({ amountMinor }) => amountMinor),
  )
  expectSum(
    ledger,
    `${place}: weight`,
    weight,
    sumOf(parts, (part) => part.weight),
  )
  for (const part of parts) {
    expectNearQuota(ledger, place, part.amountMinor, [subject.amountMinor, part.weight, weight])
  }
}

function checkTotals(ledger: Ledger, { stations, lines, holdbacks, totals }: Distribution): void {
  const deducted = sumOf(totals.deductions, ({ amountMinor }) => amountMinor)
  const pools = stations.flatMap((station) => station.pools)
  const poolsOf = (right: string): bigint =>
    sumOf(pools, (pool) => (pool.right === right ? pool.amountMinor : 0n))
  const sums: readonly [string, bigint, bigint][] = [
    ['total: fee', totals.feeMinor, sumOf(stations, ({ feeMinor }) => feeMinor)],
    ['total: deductions and net', totals.feeMinor, deducted + totals.netMinor],
    ['total: net', totals.netMinor, sumOf(stations, ({ netMinor }) => netMinor)],
    ['total: works', totals.worksMinor, poolsOf('works')],
    ['total: recordings', totals.recordingsMinor, poolsOf('recordings')],
    ['total: attributed', totals.attributedMinor, sumOf(lines, ({ amountMinor }) => amountMinor)],
    ['total: held back', totals.heldBackMinor, sumOf(holdbacks, ({ amountMinor }) => amountMinor)],
    ['total: division of net', totals.netMinor, totals.attributedMinor + totals.heldBackMinor],
    ['total: rights', totals.netMinor, totals.worksMinor + totals.recordingsMinor],
  ]
  for (const [where, expected, found] of sums) expectSum(ledger, where, expected, found)
}
