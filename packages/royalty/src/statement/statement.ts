import { type DeductionLine } from '../fees/apply-deductions.ts'
import { type DistributionLine, type Holdback } from '../distribution/distribution.ts'

/** Somebody a statement can be made out to. */
export type Payee = {
  readonly partyId: string
  readonly name: string
  readonly ipiNameNumber: string | null
}

/** An amount of the payee by right. */
export type RightsAmount = { readonly worksMinor: bigint; readonly recordingsMinor: bigint }

/** What came to the payee from one station, and the coverage it rests on. Gross − deductions = net = works + recordings. */
export type StatementStation = RightsAmount & {
  readonly stationId: string
  readonly grossMinor: bigint
  readonly deductions: readonly DeductionLine[]
  readonly netMinor: bigint
  readonly heldSeconds: number
  readonly expectedSeconds: number
}

/**
 * A payee's month. Gross − deductions = net, and net is the sum of the lines. The gross is the part of the stations'
 * fees behind the payee's lines, each deduction the payee's part of what was taken from those fees.
 */
export type Statement = RightsAmount & {
  readonly payee: Payee
  readonly month: string
  readonly currency: string
  readonly ruleVersion: string
  readonly grossMinor: bigint
  readonly deductions: readonly DeductionLine[]
  readonly netMinor: bigint
  readonly stations: readonly StatementStation[]
  readonly lines: readonly DistributionLine[]
  /** Amounts kept apart on subjects in which the payee has a share. They are whole amounts, not the payee's part. */
  readonly holdbacks: readonly Holdback[]
}
