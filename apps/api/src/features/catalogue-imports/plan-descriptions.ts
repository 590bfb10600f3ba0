import { randomUUID } from 'node:crypto'
import type { CatalogueRow } from './catalogue-row.ts'
import { nameKey, type HeldRecording, type HeldWork } from './catalogue-state.ts'
import type { RowReport } from './row-report.ts'

/** A recording as its rows describe it, beside what is held of it and of its work. */
export type DescribedRecording = {
  recording: HeldRecording
  heldRecording: HeldRecording | null
  work: HeldWork | null
  heldWork: HeldWork | null
}

type Value = string | number | null

const fields = [
  { name: 'title', of: (row: CatalogueRow): Value => row.title },
  { name: 'artist', of: (row: CatalogueRow): Value => row.artist },
  { name: 'duration', of: (row: CatalogueRow): Value => row.durationMs },
  { name: 'work_iswc', of: (row: CatalogueRow): Value => row.workIswc },
  { name: 'work_title', of: (row: CatalogueRow): Value => row.workTitle },
] as const

const isGiven = (value: Value) => value !== null && value !== ''

/** Refuses rows that say something else of the same recording than a row above them. */
export function refuseContradictions(rows: readonly CatalogueRow[], report: RowReport): CatalogueRow[] {
  const said = new Map<string, { value: Value; line: number }>()
  return rows.filter((row) => {
    const contradictions = fields.flatMap(({ name, of }) => {
      const earlier = said.get(name)
      const isContrary = earlier !== undefined && isGiven(of(row)) && earlier.value !== of(row)
      return isContrary ? [`${name} differs from line ${earlier.line} of the same ISRC.`] : []
    })
    if (contradictions.length > 0) {
      report.refuse(row.line, ...contradictions)
      return false
    }
    for (const { name, of } of fields) {
      if (isGiven(of(row)) && !said.has(name)) said.set(name, { value: of(row), line: row.line })
    }
    return true
  })
}

/** Works by ISWC, those of the file included, so that two recordings of one new work share it. */
export class WorkPlan {
  readonly #held = new Map<string, HeldWork>()
  readonly #byIswc = new Map<string, HeldWork>()

  constructor(held: readonly HeldWork[]) {
    for (const work of held) {
      this.#held.set(work.id, work)
      if (work.iswc !== null) this.#byIswc.set(work.iswc, work)
    }
  }

  held(id: string | null): HeldWork | null {
    return id === null ? null : (this.#held.get(id) ?? null)
  }

  /** The work the rows name; without ISWC that of the recording, or a new one, since a title alone identifies nothing. */
  choose(description: {
    iswc: string | null
    workTitle: string
    title: string
    linked: HeldWork | null
  }): HeldWork | null {
    const { iswc, workTitle, linked } = description
    if (iswc === null) {
      if (linked !== null || workTitle === '') return linked
      return { id: randomUUID(), title: workTitle, iswc: null }
    }
    const known = this.#byIswc.get(iswc)
    if (known !== undefined) return workTitle === '' ? known : { ...known, title: workTitle }
    const created = { id: randomUUID(), title: workTitle === '' ? description.title : workTitle, iswc }
    this.#byIswc.set(iswc, created)
    return created
  }
}

function firstGiven<Given extends Value>(
  rows: readonly CatalogueRow[],
  of: (row: CatalogueRow) => Given,
): Given | null {
  return rows.map(of).find(isGiven) ?? null
}

/** Puts the rows of one ISRC together. Refuses them all when they do not make a recording. */
export function describeRecording(
  rows: readonly CatalogueRow[],
  recordingsByIsrc: ReadonlyMap<string, HeldRecording>,
  works: WorkPlan,
  report: RowReport,
): DescribedRecording | null {
  const isrc = rows[0]?.isrc ?? ''
  const heldRecording = recordingsByIsrc.get(isrc) ?? null
  const title = firstGiven(rows, (row) => row.title) ?? heldRecording?.title ?? null
  const artist = firstGiven(rows, (row) => row.artist) ?? heldRecording?.artist ?? null
  if (title === null || artist === null) {
    for (const { line } of rows) report.refuse(line, 'A new recording needs a title and an artist.')
    return null
  }
  const linked = works.held(heldRecording?.workId ?? null)
  const workTitle = firstGiven(rows, (row) => row.workTitle) ?? ''
  const iswc = firstGiven(rows, (row) => row.workIswc)
  const work = works.choose({ iswc, workTitle, title, linked })
  if (iswc === null && linked !== null && workTitle !== '' && nameKey(workTitle) !== nameKey(linked.title)) {
    report.say(
      rows[0]?.line ?? 0,
      `The recording belongs to the work “${linked.title}”; without an ISWC that stays.`,
    )
  }
  return {
    recording: {
      id: heldRecording?.id ?? randomUUID(),
      isrc,
      title,
      artist,
      durationMs: firstGiven(rows, (row) => row.durationMs) ?? heldRecording?.durationMs ?? null,
      workId: work?.id ?? null,
    },
    heldRecording,
    work,
    heldWork: works.held(work?.id ?? null),
  }
}
