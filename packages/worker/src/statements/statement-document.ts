/** The two bundles of rights a statement accounts for. */
export type StatementRight = 'works' | 'recordings'

/** One play behind a line. A play that earned for its work and for its recording appears in two lines. */
export type StatementPlay = {
  /** Names the play for ever, in the product and in letters about it. */
  readonly reference: string
  /** Wall-clock time at the station, YYYY-MM-DDTHH:mm:ss. */
  readonly localStart: string
  readonly recordingTitle: string
  readonly durationSeconds: number
  readonly creditedSeconds: number
}

export type StatementDeduction = {
  readonly label: string
  readonly ratePpm: number
  readonly amountMinor: bigint
}

export type StatementLine = {
  readonly title: string
  /** The artist of a recording or the creators of a work. */
  readonly creators: string
  /** ISRC or ISWC as it is printed, with its label: `ISRC AA-6Q7-20-00047`. */
  readonly code: string | null
  readonly right: StatementRight
  readonly creditedMs: bigint
  readonly sharePpm: number
  readonly amountMinor: bigint
  /** In order of time. */
  readonly plays: readonly StatementPlay[]
}

/** A station's part of the statement. Gross − deductions = net = the sum of its lines. */
export type StatementSection = {
  readonly stationName: string
  /** IANA name of the zone its times are given in. */
  readonly timeZone: string
  readonly grossMinor: bigint
  readonly deductionsMinor: bigint
  readonly netMinor: bigint
  readonly heldSeconds: number
  readonly expectedSeconds: number
  readonly lines: readonly StatementLine[]
}

export type StatementHoldback = {
  readonly title: string
  readonly creators: string
  readonly stationName: string
  readonly right: StatementRight
  /** The reason in plain words. */
  readonly explanation: string
  readonly amountMinor: bigint
}

/** Everything a statement shows, with names instead of identifiers; both the PDF and the CSV are made from it. */
export type StatementDocument = {
  readonly societyName: string
  readonly payeeName: string
  /** As it is printed; null where the party has none. */
  readonly ipiNameNumber: string | null
  readonly statementNumber: string
  readonly status: 'draft' | 'issued'
  /** `November 2026`. */
  readonly monthLabel: string
  /** First and last day of use, YYYY-MM-DD. */
  readonly firstDay: string
  readonly lastDay: string
  /** The moment the file is dated with, ISO 8601 in UTC: the same document always gives the same bytes. */
  readonly createdAt: string
  /** YYYY-MM-DD. */
  readonly approvedOn: string | null
  readonly issuedOn: string | null
  readonly currency: string
  readonly ruleVersion: string
  readonly grossMinor: bigint
  readonly deductions: readonly StatementDeduction[]
  readonly netMinor: bigint
  readonly worksMinor: bigint
  readonly recordingsMinor: bigint
  readonly sections: readonly StatementSection[]
  readonly holdbacks: readonly StatementHoldback[]
  /** The last day to question the statement, YYYY-MM-DD; null while it is a draft. */
  readonly questionUntil: string | null
  /** Where to send a question: an address, or the place in the product. */
  readonly questionContact: string
}
