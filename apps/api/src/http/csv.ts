import { pipeline, Readable } from 'node:stream'
import { stringify } from 'csv-stringify'
import { streamedFile, type FileAnswer } from './file-answer.ts'

/** One column of a CSV file: numbers stay numbers, texts are made safe for spreadsheets. */
export type CsvColumn<Row> = { header: string; value: (row: Row) => string | number | null }

/** What makes a spreadsheet take a text for a formula, per the OWASP page on CSV injection. */
const FORMULA_START = /^[=+\-@\t\r\n＝＋－＠]/

/** Puts an apostrophe before a text that a spreadsheet would run, so that it is shown as it was typed. */
export function neutraliseFormula(text: string): string {
  return FORMULA_START.test(text) ? `'${text}` : text
}

/**
 * Rows as a CSV file (RFC 4180, UTF-8 with byte-order mark so that spreadsheets read the letters right), written
 * while they are read, so that its length does not matter.
 */
export function csvAnswer<Row>(
  columns: readonly CsvColumn<Row>[],
  rows: Iterable<Row> | AsyncIterable<Row>,
  fileName: string,
): FileAnswer {
  async function* cells(): AsyncGenerator<(string | number | null)[]> {
    for await (const row of rows) {
      yield columns.map(({ value }) => {
        const cell = value(row)
        return typeof cell === 'string' ? neutraliseFormula(cell) : cell
      })
    }
  }
  const writer = stringify({
    bom: true,
    header: true,
    columns: columns.map(({ header }) => header),
    record_delimiter: 'windows',
  })
  // Errors and early ends travel both ways; whoever reads the writer learns of them there.
  pipeline(Readable.from(cells()), writer, () => undefined)
  return streamedFile({ mediaType: 'text/csv; charset=utf-8', fileName, stream: writer })
}
