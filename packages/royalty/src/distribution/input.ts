import { type DeductionRule } from '../fees/apply-deductions.ts'

/** The two bundles of rights a licence fee is divided between: authors' rights in works, neighbouring rights in recordings. */
export type Right = 'works' | 'recordings'

/** The society's rules on what counts as a play and for how long. */
export type DistributionRules = {
  /** Plays with fewer credited seconds do not count. */
  readonly minimumSeconds: number
  /** A longer play counts as this many seconds; null when there is no cap. */
  readonly capSecondsPerPlay: number | null
  /** The version of the rules, printed on every statement. */
  readonly version: string
}

/** A station's licence in the month. At most one per station. */
export type LicenceInput = {
  readonly stationId: string
  readonly monthlyFeeMinor: bigint
  readonly coveredDays: number
  readonly daysInMonth: number
  /** The part of the net fee for rights in works; the rest is for rights in recordings. */
  readonly worksPartPpm: number
  /** Airtime for which a log is held, and airtime in the covered days. Reported as coverage; no weight. */
  readonly heldSeconds: number
  readonly expectedSeconds: number
}

/** One identified play, dated in the station's own zone. */
export type PlayInput = {
  readonly playId: string
  readonly stationId: string
  readonly recordingId: string
  readonly workId: string | null
  /** YYYY-MM-DD, within the month. */
  readonly localDate: string
  /** Seconds that earn; only whole milliseconds count, the nearest one is taken. */
  readonly creditedSeconds: number
}

/** A party's share of a work or of a recording. */
export type ShareInput = {
  readonly right: Right
  /** A work for the right in works, a recording for the right in recordings. */
  readonly subjectId: string
  readonly partyId: string
  readonly sharePpm: number
  readonly validFrom: string
  /** The last day on which the share holds; null while it holds on. */
  readonly validTo: string | null
}

/** Everything a month's distribution depends on. The order within the lists makes no difference to the result. */
export type DistributionInput = {
  /** YYYY-MM. */
  readonly month: string
  readonly currency: string
  readonly rules: DistributionRules
  readonly deductions: readonly DeductionRule[]
  readonly licences: readonly LicenceInput[]
  readonly plays: readonly PlayInput[]
  readonly shares: readonly ShareInput[]
}
