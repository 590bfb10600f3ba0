import type { CsvRow } from './catalogue-csv.ts'
import { readCatalogueRow, type CatalogueRow, type RowShare } from './catalogue-row.ts'
import type { CatalogueState, HeldRecording, HeldShare, HeldWork } from './catalogue-state.ts'
import {
  describeRecording,
  refuseContradictions,
  WorkPlan,
  type DescribedRecording,
} from './plan-descriptions.ts'
import { PartyPlan, type NewParty } from './plan-parties.ts'
import { planShares, type ShareChange, type SharedRow, type ShareSubjectKey } from './plan-shares.ts'
import { RowReport, type ReportedRow } from './row-report.ts'

/** Everything an import changes, worked out before anything is written. */
export type ImportPlan = {
  newParties: NewParty[]
  newWorks: HeldWork[]
  changedWorks: HeldWork[]
  newRecordings: HeldRecording[]
  changedRecordings: HeldRecording[]
  shares: ShareChange[]
  rows: ReportedRow[]
}

/** Reads the rows on their own and opens the report. */
export function readRows(rows: readonly CsvRow[]): { readable: CatalogueRow[]; report: RowReport } {
  const report = new RowReport()
  const readable = rows.flatMap((csvRow) => {
    const reading = readCatalogueRow(csvRow)
    const { line, cells } = csvRow
    const isrc = reading.ok ? reading.row.isrc : cells.isrc.slice(0, 60)
    report.open({
      line,
      isrc,
      title: cells.title.slice(0, 200),
      messages: reading.ok ? reading.row.warnings : [],
    })
    if (reading.ok) return [reading.row]
    report.refuse(line, ...reading.messages)
    return []
  })
  return { readable, report }
}

type DescribedRow = { row: CatalogueRow; described: DescribedRecording }

function groupBy<Item>(items: readonly Item[], keyOf: (item: Item) => string): Item[][] {
  const groups = new Map<string, Item[]>()
  for (const item of items) {
    const group = groups.get(keyOf(item))
    if (group === undefined) groups.set(keyOf(item), [item])
    else group.push(item)
  }
  return [...groups.values()]
}

function subjectOf(share: RowShare, { recording, work }: DescribedRecording): ShareSubjectKey | null {
  if (share.right === 'recordings') return { workId: null, recordingId: recording.id }
  return work === null ? null : { workId: work.id, recordingId: null }
}

function toSharedRows(rows: readonly DescribedRow[], parties: PartyPlan, report: RowReport): SharedRow[] {
  return rows.flatMap(({ row: { line, share }, described }) => {
    if (share === null) return []
    const subject = subjectOf(share, described)
    if (subject === null) {
      report.refuse(line, 'The share is in a work, and no work is named: give work_iswc or work_title.')
      return []
    }
    const choice = parties.choose(share)
    if (!choice.ok) {
      report.refuse(line, choice.message)
      return []
    }
    if (choice.warning !== null) report.say(line, choice.warning)
    return [{ line, share, subject, partyId: choice.partyId }]
  })
}

const subjectId = (subject: { workId: string | null; recordingId: string | null }) =>
  subject.workId ?? subject.recordingId ?? ''

function planAllShares(
  rows: readonly SharedRow[],
  held: readonly HeldShare[],
  report: RowReport,
): ShareChange[] {
  const heldBySubject = new Map(
    groupBy(held, subjectId).map((group) => [group[0] === undefined ? '' : subjectId(group[0]), group]),
  )
  return groupBy(rows, ({ subject }) => subjectId(subject)).flatMap((group) => {
    const [first] = group
    return first === undefined
      ? []
      : planShares(group, heldBySubject.get(subjectId(first.subject)) ?? [], report)
  })
}

function isSameRecording(left: HeldRecording, right: HeldRecording): boolean {
  return (
    left.title === right.title &&
    left.artist === right.artist &&
    left.durationMs === right.durationMs &&
    left.workId === right.workId
  )
}

/** Works and recordings that rows still standing make or change; each is told by the first such row. */
function planDescriptions(rows: readonly DescribedRow[], report: RowReport) {
  const works = new Map<string, { work: HeldWork; isNew: boolean }>()
  const recordings = new Map<string, { recording: HeldRecording; isNew: boolean }>()
  const seen = new Set<string>()
  for (const { row, described } of rows) {
    const { recording, heldRecording, work, heldWork } = described
    if (work !== null && !seen.has(work.id)) {
      seen.add(work.id)
      const isChanged = heldWork !== null && heldWork.title !== work.title
      if (heldWork === null || isChanged) {
        works.set(work.id, { work, isNew: heldWork === null })
        report.note(row.line, heldWork === null ? 'created' : 'updated')
      }
    }
    if (seen.has(recording.id)) continue
    seen.add(recording.id)
    if (heldRecording === null || !isSameRecording(heldRecording, recording)) {
      recordings.set(recording.id, { recording, isNew: heldRecording === null })
      report.note(row.line, heldRecording === null ? 'created' : 'updated')
    }
  }
  return { works: [...works.values()], recordings: [...recordings.values()] }
}

/** Rows of one new or changed work by different recordings must agree on its title. */
function refuseWorkContradictions(rows: readonly CatalogueRow[], report: RowReport): CatalogueRow[] {
  const titles = new Map<string, { title: string; line: number }>()
  return rows.filter(({ line, workIswc, workTitle }) => {
    if (workIswc === null || workTitle === '') return true
    const earlier = titles.get(workIswc)
    if (earlier === undefined) titles.set(workIswc, { title: workTitle, line })
    else if (earlier.title !== workTitle) {
      report.refuse(line, `work_title differs from line ${earlier.line} of the same ISWC.`)
      return false
    }
    return true
  })
}

/** Works out what a file changes: nothing is written, and a row either counts whole or not at all. */
export function planImport(
  readable: readonly CatalogueRow[],
  report: RowReport,
  state: CatalogueState,
): ImportPlan {
  const works = new WorkPlan(state.works)
  const parties = new PartyPlan(state.parties)
  const recordingsByIsrc = new Map(state.recordings.map((recording) => [recording.isrc, recording]))
  const agreeing = groupBy(refuseWorkContradictions(readable, report), ({ isrc }) => isrc)
    .map((group) => refuseContradictions(group, report))
    .filter((group) => group.length > 0)
  const described = agreeing.flatMap((group): DescribedRow[] => {
    const recording = describeRecording(group, recordingsByIsrc, works, report)
    return recording === null ? [] : group.map((row) => ({ row, described: recording }))
  })
  const sharedRows = toSharedRows(described, parties, report)
  const shares = planAllShares(sharedRows, state.shares, report)
  for (const { line, change } of shares) report.note(line, change)
  const standing = described
    .filter(({ row }) => !report.isRefused(row.line))
    .sort((left, right) => left.row.line - right.row.line)
  const descriptions = planDescriptions(standing, report)
  const partyIds = new Set(shares.map(({ partyId }) => partyId))
  return {
    newParties: [...partyIds].flatMap((id) => parties.created(id) ?? []),
    newWorks: descriptions.works.filter(({ isNew }) => isNew).map(({ work }) => work),
    changedWorks: descriptions.works.filter(({ isNew }) => !isNew).map(({ work }) => work),
    newRecordings: descriptions.recordings.filter(({ isNew }) => isNew).map(({ recording }) => recording),
    changedRecordings: descriptions.recordings
      .filter(({ isNew }) => !isNew)
      .map(({ recording }) => recording),
    shares,
    rows: report.rows(),
  }
}
