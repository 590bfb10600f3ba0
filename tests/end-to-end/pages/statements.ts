import { readFile } from 'node:fs/promises'
import type { Page } from 'playwright'
import { runProgram } from '../../corpus/index.ts'

/** What stands in the rows of the list of statements, one text a row. */
export async function listedStatements(page: Page): Promise<string[]> {
  const rows = page
    .getByRole('table')
    .getByRole('row')
    .filter({ has: page.getByRole('rowheader') })
  await rows.first().waitFor()
  return (await rows.allInnerTexts()).map((text) => text.replaceAll(/\s+/g, ' '))
}

async function download(page: Page, name: 'PDF' | 'CSV'): Promise<string> {
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name, exact: true }).click(),
  ])
  return file.path()
}

/** Downloads the statement one is on and reads it as a person would. */
export async function downloadPdfText(page: Page): Promise<string> {
  return (await runProgram('pdftotext', ['-layout', await download(page, 'PDF'), '-'])).toString()
}

/** Downloads the statement one is on as rows of cells; no cell of it has a comma or a quote in it. */
export async function downloadCsvRows(page: Page): Promise<Record<string, string>[]> {
  const text = (await readFile(await download(page, 'CSV'), 'utf8')).replace(/^\ufeff/, '')
  const [head = [], ...rows] = text
    .trimEnd()
    .split('\r\n')
    .map((line) => line.split(','))
  return rows.map((cells) => Object.fromEntries(head.map((name, index) => [name, cells[index] ?? ''])))
}
