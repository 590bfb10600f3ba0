import type {
  EndpointResult,
  getDistribution,
  listDistributions,
  Month,
  MonthStatus,
} from '@fieldfare/contracts'
import { divideHalfEven } from '@fieldfare/royalty'
import type { StationReference } from '../../records/references.ts'
import type { PoolPart, RunParts, StationPart } from './distribution-parts.repository.ts'
import type { RunRow } from './distribution-state.repository.ts'
import type { Refusal } from './distributions.policy.ts'

type SummaryInput = EndpointResult<typeof listDistributions>['items'][number]
type ViewInput = EndpointResult<typeof getDistribution>
type StationInput = ViewInput['stations'][number]

const HOUR_MS = 3_600_000n

function amount(minor: bigint): string
function amount(minor: bigint | null): string | null
function amount(minor: bigint | null): string | null {
  return minor === null ? null : minor.toString()
}

/** Milliseconds of a month are far below 2^53. */
function seconds(milliseconds: bigint): number {
  return Number(milliseconds) / 1000
}

function presentStation(station: StationReference): StationInput['station'] {
  const { id, callName, name, timeZone } = station
  return { id, callName, name, timeZone }
}

export function presentSummary(
  month: Month,
  status: MonthStatus,
  run: RunRow | null,
  currency: string,
): SummaryInput {
  return {
    month,
    status,
    currency: run?.currency ?? currency,
    feeMinor: amount(run?.feeMinor ?? null),
    netMinor: amount(run?.netMinor ?? null),
    allocatedMinor: amount(run?.allocatedMinor ?? null),
    heldBackMinor: amount(run?.heldBackMinor ?? null),
    payees: run?.payees ?? 0,
    plays: run?.plays ?? 0,
    calculatedAt: run?.calculatedAt ?? null,
    calculatedByName: run?.requestedByName ?? null,
    approvedAt: run?.approvedAt ?? null,
    approvedByName: run?.approvedByName ?? null,
    issuedAt: run?.issuedAt ?? null,
  }
}

function presentPool(pool: PoolPart): StationInput['pools'][number] {
  return {
    right: pool.right,
    poolMinor: amount(pool.poolMinor),
    plays: pool.plays,
    creditedSeconds: seconds(pool.creditedMs),
    perHourMinor:
      pool.creditedMs === 0n ? null : amount(divideHalfEven(pool.poolMinor * HOUR_MS, pool.creditedMs)),
    allocatedMinor: amount(pool.allocatedMinor),
    heldBackMinor: amount(pool.heldBackMinor),
  }
}

function presentStationPart(part: StationPart, parts: RunParts): StationInput {
  return {
    station: presentStation(part.station),
    heldSeconds: seconds(part.heldMs),
    expectedSeconds: seconds(part.expectedMs),
    coveredDays: part.coveredDays,
    feeMinor: amount(part.feeMinor),
    deductions: parts.deductions
      .filter(({ stationId }) => stationId === part.station.id)
      .map(({ code, label, ratePpm, amountMinor }) => ({
        code,
        label,
        ratePpm,
        amountMinor: amount(amountMinor),
      })),
    netMinor: amount(part.netMinor),
    pools: parts.pools.filter(({ stationId }) => stationId === part.station.id).map(presentPool),
  }
}

function presentStep(refusal: Refusal | null): { allowed: boolean; reason: string | null } {
  return { allowed: refusal === null, reason: refusal?.reason ?? null }
}

export type DistributionFacts = {
  month: Month
  status: MonthStatus
  currency: string
  run: RunRow | null
  failure: string | null
  parts: RunParts
  cautions: string[]
  steps: Record<keyof ViewInput['steps'], Refusal | null>
}

export function presentDistribution(facts: DistributionFacts): ViewInput {
  const { month, status, run, parts, steps } = facts
  return {
    ...presentSummary(month, status, run, facts.currency),
    id: run?.id ?? null,
    run: run?.run ?? null,
    ruleVersion: run?.ruleVersion ?? null,
    digest: run?.digest ?? null,
    failure: facts.failure,
    stations: parts.stations.map((part) => presentStationPart(part, parts)),
    holdbacks: parts.holdbacks.map((holdback) => ({
      station: presentStation(holdback.station),
      right: holdback.right,
      subject: holdback.subject,
      reasonCode: holdback.reasonCode,
      reason: holdback.reason,
      amountMinor: amount(holdback.amountMinor),
    })),
    payeeTotals: parts.payees.map(({ partyId, partyName, amountMinor, statementId }) => ({
      party: { id: partyId, name: partyName },
      amountMinor: amount(amountMinor),
      statementId,
    })),
    cautions: facts.cautions,
    steps: {
      calculate: presentStep(steps.calculate),
      approve: presentStep(steps.approve),
      issue: presentStep(steps.issue),
      reopen: presentStep(steps.reopen),
    },
  }
}
