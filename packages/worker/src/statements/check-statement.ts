import { RoyaltyError } from '@fieldfare/royalty'
import { type StatementDocument } from './statement-document.ts'

function sum(amounts: readonly bigint[]): bigint {
  return amounts.reduce((total, amount) => total + amount, 0n)
}

/**
 * Adds a statement up once more before it is written, so that neither file can show a total its lines do not give.
 *
 * @throws RoyaltyError `not-closed`, naming the sum that is wrong
 */
export function checkStatement(statement: StatementDocument): void {
  const { grossMinor, deductions, netMinor, sections, statementNumber } = statement
  const sums: (readonly [string, bigint, bigint])[] = [
    ['gross less deductions', netMinor, grossMinor - sum(deductions.map(({ amountMinor }) => amountMinor))],
    ['works and recordings', netMinor, statement.worksMinor + statement.recordingsMinor],
    ['net of stations', netMinor, sum(sections.map((section) => section.netMinor))],
    ['gross of stations', grossMinor, sum(sections.map((section) => section.grossMinor))],
  ]
  for (const section of sections) {
    const { stationName, lines } = section
    sums.push(
      [`lines of ${stationName}`, section.netMinor, sum(lines.map(({ amountMinor }) => amountMinor))],
      [`net of ${stationName}`, section.netMinor, section.grossMinor - section.deductionsMinor],
    )
  }
  for (const [what, expected, found] of sums) {
    if (expected === found) continue
    const message = `Statement ${statementNumber} is not closed: ${what} should be ${expected}, not ${found}.`
    throw new RoyaltyError('not-closed', message)
  }
}
