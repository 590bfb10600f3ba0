import { parseAmount } from '@fieldfare/royalty'
import { parse } from 'csv-parse/sync'
import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { renderStatementCsv } from './render-statement-csv.ts'
import { type StatementDocument } from './statement-document.ts'
import { sampleStatement } from './testing/sample-statement.ts'

const rowsSchema = z.array(z.record(z.string(), z.string()))

function rowsOf(statement: StatementDocument): readonly Record<string, string>[] {
  return rowsSchema.parse(parse(renderStatementCsv(statement), { bom: true, columns: true }))
}

function amountsOf(statement: StatementDocument, record: string): readonly bigint[] {
  return rowsOf(statement)
    .filter((row) => row['record'] === record)
    .map((row) => parseAmount(row['amount'] ?? '', statement.currency))
}

function sum(amounts: readonly bigint[]): bigint {
  return amounts.reduce((total, amount) => total + amount, 0n)
}

describe('renderStatementCsv', () => {
  it.each(['EUR', 'JPY', 'KWD'])('adds up to the unit in %s', (currency) => {
    const statement = sampleStatement(3, 12, { currency })
    expect(sum(amountsOf(statement, 'line'))).toBe(statement.netMinor)
    expect(sum(amountsOf(statement, 'station'))).toBe(statement.netMinor)
    expect(amountsOf(statement, 'net')).toEqual([statement.netMinor])
    expect(sum(amountsOf(statement, 'gross')) + sum(amountsOf(statement, 'deduction'))).toBe(
      statement.netMinor,
    )
  })

  it('begins with a byte order mark and ends every row with CRLF, as RFC 4180 has it', () => {
    const text = renderStatementCsv(sampleStatement(1, 2))
    expect(Buffer.from(text, 'utf8').subarray(0, 3).toString('hex')).toBe('efbbbf')
    expect(text.endsWith('\r\n')).toBe(true)
    expect(text.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/)
  })

  it.each(['=1+2', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1', ' =HYPERLINK("x")', '＝1'])(
    'makes a payee named %j text, and leaves negative amounts numbers',
    (payeeName) => {
      const statement = sampleStatement(1, 1, { payeeName })
      for (const row of rowsOf(statement)) expect(row['payee']).toBe(`'${payeeName}`)
      const deduction = rowsOf(statement).find((row) => row['record'] === 'deduction')
      expect(deduction?.['amount']).toMatch(/^-\d+\.\d\d$/)
    },
  )

  it('neutralises titles, creators, stations and reasons as well', () => {
    const evil = '=cmd|calc'
    const statement = sampleStatement(1, 1)
    const sections = statement.sections.map((section) => ({
      ...section,
      stationName: evil,
      lines: section.lines.map((line) => ({
        ...line,
        title: evil,
        creators: evil,
        plays: line.plays.map((play) => ({ ...play, recordingTitle: evil })),
      })),
    }))
    const holdbacks = [
      {
        title: evil,
        creators: evil,
        stationName: evil,
        right: 'works' as const,
        explanation: evil,
        amountMinor: 1n,
      },
    ]
    const cells = rowsOf({ ...statement, sections, holdbacks }).flatMap((row) => Object.values(row))
    expect(cells.filter((cell) => cell.includes('cmd')).every((cell) => cell === `'${evil}`)).toBe(true)
    expect(cells).toContain(`'${evil}`)
  })

  it('keeps commas, quotes and line breaks within their cell', () => {
    const payeeName = 'Wren, "Otter" & Sons'
    expect(rowsOf(sampleStatement(1, 1, { payeeName }))[0]?.['payee']).toBe(payeeName)
  })

  it('refuses a statement that does not add up', () => {
    const statement = sampleStatement(1, 1)
    expect(() => renderStatementCsv({ ...statement, netMinor: statement.netMinor + 1n })).toThrow(
      expect.objectContaining({ code: 'not-closed' }),
    )
  })
})
