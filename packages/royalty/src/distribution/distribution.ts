import { type DeductionLine } from '../fees/apply-deductions.ts'
import { type DistributionRules, type Right } from './input.ts'

/** Why an amount is kept apart instead of being attributed. */
export type HoldbackReason =
  'no-plays' | 'no-work' | 'no-shares' | 'no-valid-share' | 'shares-incomplete' | 'shares-over-claimed'

/** What an amount was earned by: a work, a recording, or, in the pool for works, a recording whose work is unknown. */
export type SubjectKind = 'work' | 'recording'

/** A work's or recording's part of one pool. */
export type SubjectAmount = {
  readonly subjectId: string
  readonly subjectKind: SubjectKind
  readonly plays: number
  /** The counted milliseconds of its plays: its weight in the pool. */
  readonly weightedMs: bigint
  readonly amountMinor: bigint
}

/**
 * One right's part of a station's net fee. The point value is the exact ratio `amountMinor / weightedMs`, in minor
 * units per millisecond; there is none when nothing was counted.
 */
export type Pool = {
  readonly right: Right
  readonly amountMinor: bigint
  readonly weightedMs: bigint
  readonly plays: number
  readonly subjects: readonly SubjectAmount[]
}

/** One station's month: its fee, what was taken from it, and the pools that were divided. */
export type StationDistribution = {
  readonly stationId: string
  readonly monthlyFeeMinor: bigint
  readonly coveredDays: number
  readonly daysInMonth: number
  readonly feeMinor: bigint
  readonly deductions: readonly DeductionLine[]
  readonly netMinor: bigint
  readonly worksPartPpm: number
  readonly pools: readonly Pool[]
  readonly heldSeconds: number
  readonly expectedSeconds: number
  readonly playsCounted: number
  /** Plays shorter than the society's minimum; they earn nothing. */
  readonly playsBelowMinimum: number
}

/** A party's amount from one work or recording on one station at one share. */
export type DistributionLine = {
  readonly stationId: string
  readonly right: Right
  readonly subjectId: string
  readonly partyId: string
  readonly sharePpm: number
  readonly plays: number
  readonly creditedMs: bigint
  /** Counted milliseconds × share in parts per million: the line's weight in the amount of its subject. */
  readonly weight: bigint
  readonly amountMinor: bigint
  /** Ascending. */
  readonly playIds: readonly string[]
}

/** An amount kept apart, by name. Nothing of it has gone to anyone else. */
export type Holdback = {
  readonly stationId: string
  readonly right: Right
  /** Null for a whole pool. */
  readonly subjectId: string | null
  readonly subjectKind: SubjectKind | null
  readonly reason: HoldbackReason
  /** The reason in plain words. */
  readonly explanation: string
  readonly plays: number
  readonly creditedMs: bigint
  readonly weight: bigint
  readonly amountMinor: bigint
  /** Ascending. */
  readonly playIds: readonly string[]
  /** Parties with a share in the subject: those valid on the day, or any recorded one where none was valid. */
  readonly claimantPartyIds: readonly string[]
}

/** Sums over all stations. Fee = deductions + net; net = works + recordings = attributed + held back. */
export type DistributionTotals = {
  readonly feeMinor: bigint
  readonly deductions: readonly DeductionLine[]
  readonly netMinor: bigint
  readonly worksMinor: bigint
  readonly recordingsMinor: bigint
  readonly attributedMinor: bigint
  readonly heldBackMinor: bigint
  readonly playsCounted: number
  readonly playsBelowMinimum: number
  readonly playsWithoutLicence: number
}

/** A month's distribution. Every list is in a fixed order, so equal input gives an equal distribution. */
export type Distribution = {
  readonly month: string
  readonly currency: string
  readonly rules: DistributionRules
  readonly stations: readonly StationDistribution[]
  readonly lines: readonly DistributionLine[]
  readonly holdbacks: readonly Holdback[]
  /** Plays on stations without a licence in the month: there is no fee to divide over them. Ascending. */
  readonly playIdsWithoutLicence: readonly string[]
  readonly totals: DistributionTotals
}
