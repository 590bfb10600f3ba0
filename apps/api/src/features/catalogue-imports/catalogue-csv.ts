import { isUtf8 } from 'node:buffer'
import { readFile } from 'node:fs/promises'
import { catalogueCsvColumns } from '@fieldfare/contracts'
import { CsvError, parse } from 'csv-parse'
import { z } from 'zod'
import { AppError } from '../../http/app-error.ts'
import type { UploadedFile } from '../../http/upload.ts'

export const MAXIMUM_ROWS = 20_000
export const MAXIMUM_BYTES = 20 * 1024 ** 2

export type CatalogueColumn = (typeof catalogueCsvColumns)[number]
export type CsvRow = { line: number; cells: Record<CatalogueColumn, string> }

const recordSchema = z.object({ record: z.array(z.string()), info: z.object({ lines: z.number() }) })

function refused(message: string): AppError {
  return new AppError('file-refused', { detail: message, fieldErrors: [{ path: 'file', message }] })
}

/** @throws AppError file-refused that names the first line which is no UTF-8 */
function assertUtf8(bytes: Buffer): void {
  if (isUtf8(bytes) && !bytes.includes(0)) return
  const isUtf16 = (bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff)
  if (isUtf16) throw refused('The file is in UTF-16. Save it as CSV in UTF-8 and send it again.')
  let line = 1
  for (let start = 0; start < bytes.length; line += 1) {
    const newline = bytes.indexOf(0x0a, start)
    const end = newline < 0 ? bytes.length : newline
    const content = bytes.subarray(start, end)
    if (!isUtf8(content) || content.includes(0)) break
    start = end + 1
  }
  throw refused(
    `The file is not in UTF-8: line ${line} holds bytes that are no letters in it. Save it as CSV in UTF-8 and send it again.`,
  )
}

/** The mark that stands between the names of the columns. */
function detectDelimiter(bytes: Buffer): ',' | ';' {
  const newline = bytes.indexOf(0x0a)
  const header = bytes.toString('utf8', 0, newline < 0 ? bytes.length : newline)
  return header.split(';').length > header.split(',').length ? ';' : ','
}

function readHeader(cells: readonly string[]): Map<CatalogueColumn, number> {
  const names = cells.map((cell) => cell.trim().toLowerCase())
  const known: readonly string[] = catalogueCsvColumns
  const unknown = names
    .filter((name) => !known.includes(name))
    .map((name) => (name === '' ? 'one without a name' : name))
  const missing = catalogueCsvColumns.filter((name) => !names.includes(name))
  const doubled = catalogueCsvColumns.filter((name) => names.indexOf(name) !== names.lastIndexOf(name))
  const complaints = [
    ...(missing.length > 0 ? [`missing: ${missing.join(', ')}`] : []),
    ...(unknown.length > 0 ? [`not known: ${unknown.join(', ')}`] : []),
    ...(doubled.length > 0 ? [`there twice: ${doubled.join(', ')}`] : []),
  ]
  if (complaints.length > 0)
    throw refused(`The columns of the first line do not fit – ${complaints.join('; ')}.`)
  return new Map(catalogueCsvColumns.map((name) => [name, names.indexOf(name)]))
}

function explain(error: CsvError, line: number): AppError {
  const words: Partial<Record<string, string>> = {
    CSV_QUOTE_NOT_CLOSED: `A quotation mark opened in line ${line} is never closed.`,
    CSV_INVALID_CLOSING_QUOTE: `In line ${line} something follows a closing quotation mark; write "" for a quotation mark within a text.`,
    INVALID_OPENING_QUOTE: `In line ${line} a quotation mark stands within a cell that does not begin with one.`,
    CSV_MAX_RECORD_SIZE: `Line ${line} is far too long; a quotation mark may be missing in it.`,
  }
  return refused(words[error.code] ?? `Line ${line} cannot be read as CSV.`)
}

/** Records with the line each begins on. A cell may hold line breaks, and empty lines are passed over. */
async function* readRecords(bytes: Buffer): AsyncGenerator<{ line: number; record: string[] }> {
  let lastLine = 0
  const parser = parse({
    // Told at once for each record; what is still on its way when an error comes never arrives.
    on_record: (record: string[], { lines }) => {
      lastLine = lines
      return record
    },
    bom: true,
    delimiter: detectDelimiter(bytes),
    info: true,
    relax_column_count: true,
    skip_empty_lines: true,
    max_record_size: 65_536,
  })
  parser.end(bytes)
  try {
    for await (const chunk of parser) {
      const { record, info } = recordSchema.parse(chunk)
      const breaks = record.reduce((sum, cell) => sum + cell.split('\n').length - 1, 0)
      yield { line: info.lines - breaks, record }
    }
  } catch (error) {
    if (error instanceof CsvError) throw explain(error, lastLine + 1)
    throw error
  }
}

function cellsOf(
  record: readonly string[],
  positions: ReadonlyMap<CatalogueColumn, number>,
): CsvRow['cells'] {
  const cell = (name: CatalogueColumn) =>
    record[positions.get(name) ?? -1]?.trimEnd().replace(/^ +/, '') ?? ''
  return {
    isrc: cell('isrc'),
    title: cell('title'),
    artist: cell('artist'),
    duration: cell('duration'),
    work_iswc: cell('work_iswc'),
    work_title: cell('work_title'),
    right: cell('right'),
    party_ipi: cell('party_ipi'),
    party_name: cell('party_name'),
    share_percent: cell('share_percent'),
    valid_from: cell('valid_from'),
    valid_to: cell('valid_to'),
  }
}

/** @throws AppError file-refused or file-too-large, naming the line where there is one */
export async function readCatalogueCsv(file: UploadedFile): Promise<CsvRow[]> {
  if (file.sizeBytes > MAXIMUM_BYTES) {
    throw new AppError('file-too-large', {
      detail: 'A catalogue file may have at most 20 MB. Send it in parts.',
    })
  }
  const bytes = await readFile(file.path)
  assertUtf8(bytes)
  const rows: CsvRow[] = []
  let positions: Map<CatalogueColumn, number> | null = null
  for await (const { line, record } of readRecords(bytes)) {
    if (positions === null) positions = readHeader(record)
    else rows.push({ line, cells: cellsOf(record, positions) })
    if (rows.length > MAXIMUM_ROWS) throw refused('The file has more than 20,000 rows. Send it in parts.')
  }
  if (positions === null) throw refused('The file is empty.')
  if (rows.length === 0) throw refused('The file has a line of column names, and no row below it.')
  return rows
}
