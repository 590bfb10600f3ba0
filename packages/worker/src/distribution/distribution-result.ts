import { partyIdSchema } from '@fieldfare/contracts'
import type {
  DistributionResult,
  DistributionRun,
  HoldbackResult,
  StatementLineResult,
  StatementResult,
  StationResult,
  SubjectNames,
  SubjectReference,
} from '@fieldfare/database'
import type {
  Distribution,
  DistributionInput,
  DistributionLine,
  Holdback,
  Statement,
  StationDistribution,
  SubjectKind,
} from '@fieldfare/royalty'
import { v5 as uuidV5 } from 'uuid'

export type NamesOfTheMonth = {
  subjects: ReadonlyMap<string, SubjectNames>
  stations: ReadonlyMap<string, string>
}

function referenceTo(subjectId: string | null, subjectKind: SubjectKind | null): SubjectReference {
  return {
    workId: subjectKind === 'work' ? subjectId : null,
    recordingId: subjectKind === 'recording' ? subjectId : null,
  }
}

function sumOf<Item>(items: readonly Item[], amount: (item: Item) => bigint): bigint {
  return items.reduce((sum, item) => sum + amount(item), 0n)
}

function describeStation(station: StationDistribution, distribution: Distribution): StationResult {
  const isHere = ({ stationId }: { stationId: string }) => stationId === station.stationId
  const lines = distribution.lines.filter(isHere)
  const holdbacks = distribution.holdbacks.filter(isHere)
  return {
    stationId: station.stationId,
    heldMs: Math.round(station.heldSeconds * 1000),
    expectedMs: Math.round(station.expectedSeconds * 1000),
    coveredDays: station.coveredDays,
    feeMinor: station.feeMinor,
    netMinor: station.netMinor,
    deductions: station.deductions,
    pools: station.pools.map((pool) => ({
      right: pool.right,
      poolMinor: pool.amountMinor,
      plays: pool.plays,
      creditedMs: pool.weightedMs,
      allocatedMinor: sumOf(
        lines.filter(({ right }) => right === pool.right),
        ({ amountMinor }) => amountMinor,
      ),
      heldBackMinor: sumOf(
        holdbacks.filter(({ right }) => right === pool.right),
        ({ amountMinor }) => amountMinor,
      ),
    })),
  }
}

/** Ids follow from the run, so that calculating the same run again names the same rows. */
function holdbackId(runId: string, holdback: Holdback): string {
  const { stationId, right, subjectId, reason } = holdback
  return uuidV5(`holdback/${stationId}/${right}/${subjectId ?? 'pool'}/${reason}`, runId)
}

function describeHoldback(runId: string, holdback: Holdback, names: NamesOfTheMonth): HoldbackResult {
  const subject = holdback.subjectId === null ? undefined : names.subjects.get(holdback.subjectId)
  return {
    ...referenceTo(holdback.subjectId, holdback.subjectKind),
    id: holdbackId(runId, holdback),
    stationId: holdback.stationId,
    right: holdback.right,
    subject: subject ? [subject.title, subject.artist].filter(Boolean).join(' · ') : 'Whole pool',
    reasonCode: holdback.reason,
    reason: holdback.explanation,
    amountMinor: holdback.amountMinor,
  }
}

function describeLine(
  line: DistributionLine,
  names: NamesOfTheMonth,
  creditedMs: ReadonlyMap<string, bigint>,
): StatementLineResult {
  const subject = names.subjects.get(line.subjectId)
  if (subject === undefined) throw new Error(`No name is known for ${line.subjectId}`)
  return {
    ...referenceTo(line.subjectId, line.right === 'works' ? 'work' : 'recording'),
    right: line.right,
    stationId: line.stationId,
    title: subject.title,
    artist: subject.artist,
    code: subject.code,
    plays: line.playIds.map((playId) => ({ playId, creditedMs: creditedMs.get(playId) ?? 0n })),
    creditedMs: line.creditedMs,
    sharePpm: line.sharePpm,
    amountMinor: line.amountMinor,
  }
}

/** Lines in the order of the printed statement: by station, works before recordings, by title. */
function compareLines(names: NamesOfTheMonth) {
  const keyOf = (line: StatementLineResult) => [
    names.stations.get(line.stationId) ?? '',
    line.stationId,
    line.right === 'works' ? '0' : '1',
    line.title,
    line.workId ?? line.recordingId ?? '',
    String(line.sharePpm).padStart(7, '0'),
  ]
  return (left: StatementLineResult, right: StatementLineResult): number => {
    const rightKey = keyOf(right)
    for (const [index, part] of keyOf(left).entries()) {
      const other = rightKey[index] ?? ''
      if (part !== other) return part < other ? -1 : 1
    }
    return 0
  }
}

function describeStatement(
  run: DistributionRun,
  statement: Statement,
  position: number,
  context: { names: NamesOfTheMonth; creditedMs: ReadonlyMap<string, bigint> },
): StatementResult {
  const { payee } = statement
  return {
    id: uuidV5(`statement/${payee.partyId}`, run.id),
    partyId: partyIdSchema.parse(payee.partyId),
    partyName: payee.name,
    partyIpi: payee.ipiNameNumber,
    number: `${run.month.slice(0, 7)}-${String(position).padStart(4, '0')}`,
    grossMinor: statement.grossMinor,
    netMinor: statement.netMinor,
    deductions: statement.deductions,
    stations: statement.stations.map((station) => ({
      stationId: station.stationId,
      grossMinor: station.grossMinor,
      deductionsMinor: sumOf(station.deductions, ({ amountMinor }) => amountMinor),
      netMinor: station.netMinor,
      heldMs: Math.round(station.heldSeconds * 1000),
      expectedMs: Math.round(station.expectedSeconds * 1000),
    })),
    lines: statement.lines
      .map((line) => describeLine(line, context.names, context.creditedMs))
      .sort(compareLines(context.names)),
    holdbackIds: statement.holdbacks.map((holdback) => holdbackId(run.id, holdback)),
  }
}

function creditedMsByPlay({ plays, rules }: DistributionInput): Map<string, bigint> {
  const cap = rules.capSecondsPerPlay === null ? null : Math.round(rules.capSecondsPerPlay * 1000)
  return new Map(
    plays.map(({ playId, creditedSeconds }) => {
      const lengthMs = Math.round(creditedSeconds * 1000)
      return [playId, BigInt(cap === null ? lengthMs : Math.min(cap, lengthMs))]
    }),
  )
}

/** A calculated month as rows, with the names as they are at this moment. */
export function describeDistribution(options: {
  run: DistributionRun
  input: DistributionInput
  distribution: Distribution
  statements: readonly Statement[]
  names: NamesOfTheMonth
  digest: string
}): DistributionResult {
  const { run, input, distribution, statements, names, digest } = options
  const context = { names, creditedMs: creditedMsByPlay(input) }
  return {
    digest,
    feeMinor: distribution.totals.feeMinor,
    netMinor: distribution.totals.netMinor,
    allocatedMinor: distribution.totals.attributedMinor,
    heldBackMinor: distribution.totals.heldBackMinor,
    plays: distribution.totals.playsCounted,
    stations: distribution.stations.map((station) => describeStation(station, distribution)),
    holdbacks: distribution.holdbacks.map((holdback) => describeHoldback(run.id, holdback, names)),
    statements: statements.map((statement, index) => describeStatement(run, statement, index + 1, context)),
  }
}
