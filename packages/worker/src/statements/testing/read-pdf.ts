import { execFileSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** Runs one of poppler's readers on a PDF and gives what it prints. */
function readWith(
  program: string,
  pdf: Buffer,
  options: readonly string[],
  output: readonly string[] = [],
): string {
  const folder = mkdtempSync(join(tmpdir(), 'statement-'))
  try {
    const path = join(folder, 'statement.pdf')
    writeFileSync(path, pdf)
    return execFileSync(program, [...options, path, ...output], {
      encoding: 'utf8',
      maxBuffer: 64 * 1024 * 1024,
    })
  } finally {
    rmSync(folder, { recursive: true })
  }
}

/** The text of each page, laid out as it stands on it. */
export function readPages(pdf: Buffer): readonly string[] {
  return readWith('pdftotext', pdf, ['-layout'], ['-']).split('\f').slice(0, -1)
}

/** Every font of the file: its name and whether it is embedded. */
export function readFonts(pdf: Buffer): readonly { name: string; embedded: boolean }[] {
  return readWith('pdffonts', pdf, [])
    .trim()
    .split('\n')
    .slice(2)
    .map((row) => ({
      name: row.split(/\s+/)[0] ?? '',
      embedded: / (yes|no) +(yes|no) +(yes|no) +\d+ +\d+$/.exec(row)?.[1] === 'yes',
    }))
}

/** What the file says of itself. */
export function readInformation(pdf: Buffer): string {
  return readWith('pdfinfo', pdf, ['-isodates'])
}

/** The structure tree with its text, as assistive software sees it. */
export function readStructure(pdf: Buffer): string {
  return readWith('pdfinfo', pdf, ['-struct-text'])
}
