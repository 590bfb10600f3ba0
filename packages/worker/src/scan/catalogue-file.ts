import { existsSync } from 'node:fs'
import { readFile } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { parse } from 'csv-parse/sync'
import { z } from 'zod'
import { ScanInputError } from './scan-input-error.ts'

/** One line of catalogue.csv, with the place of its audio. */
export type CatalogueRow = {
  readonly path: string
  readonly file: string
  readonly isrc: string
  readonly title: string
  readonly artist: string
}

const rowsSchema = z.array(
  z.object({
    file: z.string().min(1),
    isrc: z.string().min(1),
    title: z.string(),
    artist: z.string(),
  }),
)

function parseRows(text: string, csvPath: string): z.infer<typeof rowsSchema> {
  const records = (() => {
    try {
      const parsed: unknown = parse(text, { columns: true, bom: true, trim: true, skip_empty_lines: true })
      return parsed
    } catch (error) {
      const reason = error instanceof Error ? error.message : String(error)
      throw new ScanInputError(`${csvPath}: not a readable CSV file: ${reason}`)
    }
  })()
  const checked = rowsSchema.safeParse(records)
  if (checked.success) return checked.data
  const issue = checked.error.issues[0]
  const [row, column] = issue?.path ?? []
  throw new ScanInputError(
    `${csvPath}: line ${Number(row ?? 0) + 2} has no usable "${String(column)}" (expected columns: file,isrc,title,artist)`,
  )
}

/**
 * Reads catalogue.csv; audio lies in `catalogue/` beside it.
 * @throws ScanInputError naming the line or file that cannot be used.
 */
export async function readCatalogueFile(csvPath: string): Promise<CatalogueRow[]> {
  const text = await readFile(csvPath, 'utf8').catch(() => {
    throw new ScanInputError(`${csvPath}: no such catalogue file`)
  })
  const rows = parseRows(text, csvPath)
  if (rows.length === 0) throw new ScanInputError(`${csvPath}: lists no recordings`)
  const seen = new Set<string>()
  return rows.map((row) => {
    if (seen.has(row.isrc)) throw new ScanInputError(`${csvPath}: ISRC ${row.isrc} appears twice`)
    seen.add(row.isrc)
    const path = join(dirname(csvPath), 'catalogue', row.file)
    if (!existsSync(path)) throw new ScanInputError(`${path}: listed in ${csvPath} but not there`)
    return { ...row, path }
  })
}
