import { allocate } from '../apportionment/allocate.ts'
import { compareText } from '../compare-text.ts'
import { WHOLE_PPM } from '../fees/apply-deductions.ts'
import { groupBy, sumOf } from '../group-by.ts'
import { type CountedPlay } from './count-plays.ts'
import {
  type DistributionLine,
  type Holdback,
  type HoldbackReason,
  type Pool,
  type SubjectAmount,
  type SubjectKind,
} from './distribution.ts'
import { explainHoldback } from './holdback-reasons.ts'
import { type Right } from './input.ts'
import { type Part, type ShareTerms } from './share-terms.ts'

/** A pool with everything it was divided into. */
export type DividedPool = {
  readonly pool: Pool
  readonly lines: readonly DistributionLine[]
  readonly holdbacks: readonly Holdback[]
}

type PoolInput = {
  readonly stationId: string
  readonly right: Right
  readonly amountMinor: bigint
  readonly plays: readonly CountedPlay[]
  readonly terms: ShareTerms
}

type Subject = { subjectId: string; subjectKind: SubjectKind; plays: readonly CountedPlay[] }

/** What came together under one part of a subject: every play on whose day that part applied. */
type PartTally = { part: Part; plays: CountedPlay[]; weight: bigint; claimants: Set<string> }

/**
 * Divides a pool over subjects by their counted time, and each subject's amount over the parts its plays fall to by
 * counted time × share. Both divisions are by largest remainder, so subjects sum to the pool and parts to the
 * subject. Where fractions are equal, the smaller identifier goes first, and parties before what is held back.
 */
export function dividePool(input: PoolInput): DividedPool {
  const { right, amountMinor, plays } = input
  const weightedMs = sumOf(plays, ({ countedMs }) => countedMs)
  if (weightedMs === 0n) {
    const pool = { right, amountMinor, weightedMs, plays: 0, subjects: [] }
    return { pool, lines: [], holdbacks: amountMinor === 0n ? [] : [holdWholePool(input)] }
  }
  const subjects = groupBy(plays, (play) => subjectKey(right, play))
  const amounts = allocate(
    amountMinor,
    [...subjects].map(([key, own]) => ({ key, weight: sumOf(own, ({ countedMs }) => countedMs) })),
  )
  const divided = [...amounts].map(([key, amount]) => {
    const subject = describeSubject(key, subjects.get(key) ?? [])
    return { amounts: subjectAmount(subject, amount), ...divideSubject(input, subject, amount) }
  })
  return {
    pool: {
      right,
      amountMinor,
      weightedMs,
      plays: plays.length,
      subjects: divided.map((subject) => subject.amounts),
    },
    lines: divided.flatMap(({ lines }) => lines),
    holdbacks: divided.flatMap(({ holdbacks }) => holdbacks),
  }
}

function subjectKey(right: Right, play: CountedPlay): string {
  return right === 'works' && play.workId !== null ? `work ${play.workId}` : `recording ${play.recordingId}`
}

function describeSubject(key: string, plays: readonly CountedPlay[]): Subject {
  const [kind = '', subjectId = ''] = key.split(' ')
  return { subjectId, subjectKind: kind === 'work' ? 'work' : 'recording', plays }
}

function subjectAmount({ subjectId, subjectKind, plays }: Subject, amountMinor: bigint): SubjectAmount {
  const weightedMs = sumOf(plays, ({ countedMs }) => countedMs)
  return { subjectId, subjectKind, plays: plays.length, weightedMs, amountMinor }
}

function divideSubject(
  { stationId, right, terms }: PoolInput,
  subject: Subject,
  amountMinor: bigint,
): { lines: DistributionLine[]; holdbacks: Holdback[] } {
  const tallies = tallyParts(right, subject, terms)
  const amounts = allocate(
    amountMinor,
    [...tallies].map(([key, { weight }]) => ({ key, weight })),
  )
  const lines: DistributionLine[] = []
  const holdbacks: Holdback[] = []
  for (const [key, amount] of amounts) {
    const tally = tallies.get(key)
    if (!tally) continue
    const { part, plays, weight } = tally
    const common = {
      stationId,
      right,
      plays: plays.length,
      creditedMs: sumOf(plays, ({ countedMs }) => countedMs),
      weight,
      amountMinor: amount,
      playIds: plays.map(({ playId }) => playId).sort(compareText),
    }
    if (part.kind === 'party') {
      const { subjectId } = subject
      lines.push({ ...common, subjectId, partyId: part.partyId, sharePpm: part.ppm })
    } else {
      const claimantPartyIds = [...tally.claimants].sort(compareText)
      holdbacks.push({ ...common, ...subjectOf(subject), ...reasonOf(part.reason), claimantPartyIds })
    }
  }
  return { lines, holdbacks }
}

function tallyParts(right: Right, subject: Subject, terms: ShareTerms): Map<string, PartTally> {
  const unknownWork = right === 'works' && subject.subjectKind === 'recording'
  const tallies = new Map<string, PartTally>()
  for (const play of subject.plays) {
    const parts = unknownWork ? UNKNOWN_WORK : terms(subject.subjectId, play.localDate)
    for (const part of parts) {
      const key = partKey(part)
      const tally = tallies.get(key) ?? { part, plays: [], weight: 0n, claimants: new Set<string>() }
      tally.plays.push(play)
      tally.weight += play.countedMs * BigInt(part.ppm)
      if (part.kind === 'holdback') for (const partyId of part.claimantPartyIds) tally.claimants.add(partyId)
      tallies.set(key, tally)
    }
  }
  return tallies
}

const UNKNOWN_WORK: readonly Part[] = [
  { kind: 'holdback', reason: 'no-work', ppm: WHOLE_PPM, claimantPartyIds: [] },
]

/** Shares that change within the month stay apart; what is held back comes together by its reason. */
function partKey(part: Part): string {
  if (part.kind === 'holdback') return `unclaimed ${part.reason}`
  return `party ${part.partyId} ${part.ppm.toString().padStart(7, '0')}`
}

function subjectOf({ subjectId, subjectKind }: Subject): { subjectId: string; subjectKind: SubjectKind } {
  return { subjectId, subjectKind }
}

function reasonOf(reason: HoldbackReason): { reason: HoldbackReason; explanation: string } {
  return { reason, explanation: explainHoldback(reason) }
}

function holdWholePool({ stationId, right, amountMinor }: PoolInput): Holdback {
  return {
    stationId,
    right,
    subjectId: null,
    subjectKind: null,
    ...reasonOf('no-plays'),
    plays: 0,
    creditedMs: 0n,
    weight: 0n,
    amountMinor,
    playIds: [],
    claimantPartyIds: [],
  }
}
