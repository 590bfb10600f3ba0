import {
  localDateSchema,
  readIpi,
  readIsrc,
  readIswc,
  type LocalDate,
  type Right,
} from '@fieldfare/contracts'
import type { CatalogueColumn, CsvRow } from './catalogue-csv.ts'
import { readDuration, readPercent, type Reading } from './exact-values.ts'

export type RowShare = {
  right: Right
  partyIpi: string | null
  ipiCheckOk: boolean | null
  partyName: string
  sharePpm: number
  validFrom: LocalDate
  validTo: LocalDate | null
}

/** A row whose every cell can be read. */
export type CatalogueRow = {
  line: number
  isrc: string
  title: string
  artist: string
  durationMs: number | null
  workIswc: string | null
  workTitle: string
  share: RowShare | null
  warnings: string[]
}

export type RowReading = { ok: true; row: CatalogueRow } | { ok: false; messages: string[] }

/** What makes a spreadsheet take a text for a formula, per the OWASP page on CSV injection. */
const FORMULA_START = /^[=+\-@\t\r]/

const TEXT_LIMITS = { title: 200, artist: 200, work_title: 200, party_name: 160 } as const satisfies Partial<
  Record<CatalogueColumn, number>
>

const rightWords: ReadonlyMap<string, Right> = new Map([
  ['works', 'works'],
  ['work', 'works'],
  ['recordings', 'recordings'],
  ['recording', 'recordings'],
])

/** Collects complaints, so that a row tells all of them at once. */
type Complaints = string[]

function take<Value>(reading: Reading<Value>, complaints: Complaints): Value | null {
  if (reading.ok) return reading.value
  complaints.push(reading.message)
  return null
}

function readDay(cell: string, what: string, complaints: Complaints): LocalDate | null {
  const parsed = localDateSchema.safeParse(cell)
  if (parsed.success) return parsed.data
  complaints.push(`${what} “${cell}” is not a day written YYYY-MM-DD.`)
  return null
}

function checkTexts(cells: CsvRow['cells'], complaints: Complaints, warnings: string[]): void {
  for (const [name, limit] of Object.entries(TEXT_LIMITS)) {
    const cell = textOf(cells, name)
    if (cell.length > limit) complaints.push(`${name} has more than ${limit} characters.`)
    if (FORMULA_START.test(cell)) {
      warnings.push(`${name} begins as a formula does; it is kept as text and shown to spreadsheets as such.`)
    } else if (/\p{Cc}/u.test(cell)) complaints.push(`${name} contains characters that cannot be shown.`)
  }
}

function textOf(cells: CsvRow['cells'], name: string): string {
  return Object.entries(cells).find(([column]) => column === name)?.[1] ?? ''
}

function readShare(cells: CsvRow['cells'], complaints: Complaints, warnings: string[]): RowShare | null {
  const given = [
    cells.right,
    cells.party_ipi,
    cells.party_name,
    cells.share_percent,
    cells.valid_from,
    cells.valid_to,
  ]
  if (given.every((cell) => cell === '')) return null
  const right = rightWords.get(cells.right.toLowerCase())
  if (right === undefined) complaints.push(`right “${cells.right}” is neither works nor recordings.`)
  if (cells.party_ipi === '' && cells.party_name === '')
    complaints.push('A share needs a party: its IPI, its name or both.')
  const ipi = cells.party_ipi === '' ? null : readIpi(cells.party_ipi)
  if (ipi !== null && !ipi.ok) complaints.push(ipi.message)
  if (ipi?.ok === true && !ipi.checkOk)
    warnings.push(`The check digits of IPI ${cells.party_ipi} do not fit. Compare it with the source.`)
  const sharePpm = take(readPercent(cells.share_percent), complaints)
  const validFrom = readDay(cells.valid_from, 'valid_from', complaints)
  const validTo = cells.valid_to === '' ? null : readDay(cells.valid_to, 'valid_to', complaints)
  if (validFrom !== null && validTo !== null && validTo < validFrom)
    complaints.push('valid_to is before valid_from.')
  if (right === undefined || sharePpm === null || validFrom === null) return null
  return {
    right,
    partyIpi: ipi?.ok === true ? ipi.ipi : null,
    ipiCheckOk: ipi?.ok === true ? ipi.checkOk : null,
    partyName: cells.party_name,
    sharePpm,
    validFrom,
    validTo,
  }
}

/** Reads every cell and tells everything that is wrong with them. */
export function readCatalogueRow({ line, cells }: CsvRow): RowReading {
  const complaints: Complaints = []
  const warnings: string[] = []
  const isrc = readIsrc(cells.isrc)
  if (!isrc.ok) complaints.push(cells.isrc === '' ? 'An ISRC is needed.' : `${cells.isrc}: ${isrc.message}`)
  else if (isrc.warning !== null) warnings.push(isrc.warning)
  const iswc = cells.work_iswc === '' ? null : readIswc(cells.work_iswc)
  if (iswc !== null && !iswc.ok) complaints.push(`${cells.work_iswc}: ${iswc.message}`)
  const durationMs = cells.duration === '' ? null : take(readDuration(cells.duration), complaints)
  checkTexts(cells, complaints, warnings)
  const share = readShare(cells, complaints, warnings)
  if (!isrc.ok || complaints.length > 0) return { ok: false, messages: complaints }
  return {
    ok: true,
    row: {
      line,
      isrc: isrc.isrc,
      title: cells.title,
      artist: cells.artist,
      durationMs,
      workIswc: iswc?.ok === true ? iswc.iswc : null,
      workTitle: cells.work_title,
      share,
      warnings,
    },
  }
}
