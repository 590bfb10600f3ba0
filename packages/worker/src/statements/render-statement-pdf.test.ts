import { formatAmount, formatMoney, parseAmount } from '@fieldfare/royalty'
import { parse } from 'csv-parse/sync'
import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { renderStatementCsv } from './render-statement-csv.ts'
import { renderStatementPdf } from './render-statement-pdf.ts'
import { type StatementDocument } from './statement-document.ts'
import { formatNumbers, numberPlays } from './number-plays.ts'
import { readFonts, readInformation, readPages, readStructure } from './testing/read-pdf.ts'
import { sampleStatement } from './testing/sample-statement.ts'

const LINE_AMOUNT = /^ *\d+ .* (Work|Recording) .* ([\d,.]+)$/gm

/** The amounts of the lines in the order they are printed, read back from the pages. */
function printedLineAmounts(pages: readonly string[], currency: string): readonly bigint[] {
  return [...pages.join('\n').matchAll(LINE_AMOUNT)].map((match) => parseAmount(match[2] ?? '', currency))
}

function lineAmounts(statement: StatementDocument): readonly bigint[] {
  return statement.sections.flatMap(({ lines }) => lines.map(({ amountMinor }) => amountMinor))
}

function csvLineAmounts(statement: StatementDocument): readonly bigint[] {
  const rows = z
    .array(z.record(z.string(), z.string()))
    .parse(parse(renderStatementCsv(statement), { bom: true, columns: true }))
  return rows
    .filter((row) => row['record'] === 'line')
    .map((row) => parseAmount(row['amount'] ?? '', statement.currency))
}

describe('renderStatementPdf', () => {
  it.each(['EUR', 'JPY', 'KWD'])(
    'prints the total and every line in %s to the unit, as the CSV has them',
    async (currency) => {
      const statement = sampleStatement(3, 14, { currency })
      const pages = readPages(await renderStatementPdf(statement))
      expect(pages[0]).toContain(formatMoney(statement.netMinor, currency).replace('\u00a0', ' '))
      const printed = printedLineAmounts(pages, currency)
      expect(printed).toEqual(lineAmounts(statement))
      expect(printed).toEqual(csvLineAmounts(statement))
      for (const { stationName, netMinor } of statement.sections) {
        expect(pages.join('\n')).toMatch(
          new RegExp(`Total ${stationName} +${formatAmount(netMinor, currency)}`),
        )
      }
    },
  )

  it('numbers every page of a statement of one page and of one of many', async () => {
    const one = readPages(await renderStatementPdf(sampleStatement(0, 0)))
    expect(one).toHaveLength(1)
    expect(one[0]).toContain('Page 1 of 1')
    const many = readPages(await renderStatementPdf(sampleStatement(4, 60)))
    expect(many.length).toBeGreaterThanOrEqual(40)
    for (const [index, page] of many.entries()) expect(page).toContain(`Page ${index + 1} of ${many.length}`)
    expect(printedLineAmounts(many, 'EUR')).toHaveLength(240)
  }, 30_000)

  it('repeats the station and the headings where a table goes on', async () => {
    const [, , third = ''] = readPages(await renderStatementPdf(sampleStatement(1, 40)))
    expect(third).toMatch(
      /Radio Kestrel Bay, continued\s+No\. +Title and creators +For +Plays +Credited +Share +EUR/,
    )
  })

  it('leads from every line to its plays by number', async () => {
    const statement = sampleStatement(1, 6)
    const text = readPages(await renderStatementPdf(statement)).join('\n')
    const numbers = numberPlays(statement)
    for (const line of statement.sections.flatMap(({ lines }) => lines)) {
      const own = numbers.of(line)
      expect(text).toContain(`${own.length === 1 ? 'play' : 'plays'} ${formatNumbers(own)}`)
    }
    for (const { number, localStart, reference } of numbers.plays) {
      const [day = '', time = ''] = localStart.split('T')
      expect(text).toMatch(new RegExp(`^ *${number} +${day} +${time} .*${reference}$`, 'm'))
    }
  })

  it('shows letters of Latin, Greek and Cyrillic as they are', async () => {
    const payeeName = 'Ţăndărică & Ångström Ґалаґан Φῶς'
    const text = readPages(await renderStatementPdf(sampleStatement(1, 9, { payeeName }))).join('\n')
    for (const name of [
      payeeName,
      'Łąka o świcie',
      'Đường về bến sông',
      'Тихая вода',
      'Φως στο λιμάνι',
      'İpek Şölen',
    ]) {
      expect(text).toContain(name)
    }
    expect(text).not.toContain('□')
  })

  it('says so where letters cannot be shown', async () => {
    const [page = ''] = readPages(await renderStatementPdf(sampleStatement(0, 0, { payeeName: '波 Wave' })))
    expect(page).toContain('□ Wave')
    expect(page).toContain('Some letters are outside the typefaces of this file')
  })

  it('embeds all its fonts', async () => {
    const fonts = readFonts(await renderStatementPdf(sampleStatement(1, 3)))
    expect(fonts.map(({ name }) => name.replace(/^[A-Z]{6}\+/, '')).sort()).toEqual([
      'IBMPlexMono-Regular',
      'IBMPlexMono-SemiBold',
      'Newsreader-Medium',
      'Newsreader-SemiBold',
      'SourceSans3-Regular',
      'SourceSans3-SemiBold',
    ])
    expect(fonts.every(({ embedded }) => embedded)).toBe(true)
  })

  it('carries title, author, date, language, structure and bookmarks', async () => {
    const pdf = await renderStatementPdf(sampleStatement(2, 3))
    const information = readInformation(pdf)
    expect(information).toMatch(/^Title: +Royalty statement 2026-11-0042, November 2026$/m)
    expect(information).toMatch(/^Author: +Meridian Authors’ and Performers’ Society$/m)
    expect(information).toMatch(/^CreationDate: +2026-12-04T09:00:00Z$/m)
    expect(information).toMatch(/^Tagged: +yes$/m)
    expect(information).toMatch(/^Page size: .*A4/m)
    const bytes = pdf.toString('latin1')
    expect(bytes).toContain('/Lang (en-GB)')
    expect(bytes).toContain('/Outlines ')
    const structure = readStructure(pdf)
    for (const element of ['H1', 'H2', 'H3', 'Table', 'TH', 'TD']) {
      expect(structure).toMatch(new RegExp(`^ *${element}\\b`, 'm'))
    }
    expect(structure).not.toContain('Page 1 of')
  })

  it('shows what is held back with its reason, and how and until when to question the statement', async () => {
    const holdbacks = [
      {
        title: 'Zimní světlo',
        creators: 'Řehořova Lípa',
        stationName: 'Halcyon FM',
        right: 'works' as const,
        explanation: 'Nobody has registered a share yet.',
        amountMinor: 12_345n,
      },
    ]
    const text = readPages(await renderStatementPdf(sampleStatement(1, 2, { holdbacks }))).join('\n')
    expect(text).toMatch(/Zimní světlo +Halcyon FM +Nobody has registered a share yet\. +123\.45/)
    expect(text).toContain('You can question any line or play until 4 September 2027')
    expect(text.replace(/\s+/g, ' ')).toContain('It is not legal or tax advice. Contracts, local law')
  })

  it('marks a draft on its first page and at the foot of every page', async () => {
    const pages = readPages(await renderStatementPdf(sampleStatement(1, 30, { status: 'draft' })))
    expect(pages[0]).toContain('Draft. This statement is not approved yet')
    for (const page of pages) expect(page).toContain('Draft · Statement 2026-11-0042')
  })

  it('gives the same bytes for the same statement', async () => {
    const [first, second] = [
      await renderStatementPdf(sampleStatement(2, 10)),
      await renderStatementPdf(sampleStatement(2, 10)),
    ]
    expect(first.equals(second)).toBe(true)
  })

  it('refuses a statement that does not add up', async () => {
    const statement = sampleStatement(1, 1)
    await expect(renderStatementPdf({ ...statement, worksMinor: statement.worksMinor + 1n })).rejects.toThrow(
      expect.objectContaining({ code: 'not-closed' }),
    )
  })
})
