import { formatIpi, formatIsrc, formatIswc } from '@fieldfare/contracts'
import type {
  DistributionRun,
  RenderedLine,
  Society,
  StatementContents,
  StatementToRender,
} from '@fieldfare/database'
import { DateTime } from 'luxon'
import type { StatementDocument, StatementLine } from './statement-document.ts'

function printedCode({ right, code }: RenderedLine): string | null {
  if (code === null) return null
  return right === 'works' ? `ISWC ${formatIswc(code)}` : `ISRC ${formatIsrc(code)}`
}

/** Twelve figures name a play among all a society will ever have, and fit a printed column. */
function playReference(playId: string): string {
  return playId.replaceAll('-', '').slice(0, 12)
}

function describeLine(line: RenderedLine, contents: StatementContents, timeZone: string): StatementLine {
  return {
    title: line.title,
    creators: line.artist,
    code: printedCode(line),
    right: line.right,
    creditedMs: line.creditedMs,
    sharePpm: line.sharePpm,
    amountMinor: line.amountMinor,
    plays: contents.plays
      .filter(({ lineNumber }) => lineNumber === line.lineNumber)
      .map((play) => ({
        reference: playReference(play.playId),
        localStart: DateTime.fromISO(play.startedAt, { zone: timeZone }).toFormat("yyyy-LL-dd'T'HH:mm:ss"),
        recordingTitle: play.recordingTitle,
        durationSeconds: play.durationSeconds,
        creditedSeconds: play.creditedSeconds,
      })),
  }
}

function sumOfRight(lines: readonly RenderedLine[], right: RenderedLine['right']): bigint {
  return lines.reduce((sum, line) => (line.right === right ? sum + line.amountMinor : sum), 0n)
}

/** What is printed of an issued statement: names, days in words, codes as they are printed. */
export function describeStatementDocument(options: {
  run: DistributionRun
  statement: StatementToRender
  contents: StatementContents
  society: Society
  publicUrl: string
}): StatementDocument {
  const { run, statement, contents, society, publicUrl } = options
  const month = DateTime.fromISO(run.month, { zone: 'utc', locale: 'en-GB' })
  // The request dates the statement: the moment of rendering would differ between two tries.
  const approvedAt = run.approvedAt ?? run.requestedAt
  const approvedOn = DateTime.fromISO(approvedAt, { zone: society.timeZone })
  const issuedAt = run.issueRequestedAt ?? approvedAt
  const issuedOn = DateTime.fromISO(issuedAt, { zone: society.timeZone })
  return {
    societyName: society.name,
    payeeName: statement.partyName,
    ipiNameNumber: statement.partyIpi === null ? null : formatIpi(statement.partyIpi),
    statementNumber: statement.number,
    status: 'issued',
    monthLabel: month.toFormat('LLLL yyyy'),
    firstDay: month.toFormat('yyyy-LL-dd'),
    lastDay: month.endOf('month').toFormat('yyyy-LL-dd'),
    createdAt: issuedAt,
    approvedOn: approvedOn.toFormat('yyyy-LL-dd'),
    issuedOn: issuedOn.toFormat('yyyy-LL-dd'),
    currency: run.currency,
    ruleVersion: run.rulesVersion,
    grossMinor: statement.grossMinor,
    deductions: contents.deductions,
    netMinor: statement.netMinor,
    worksMinor: sumOfRight(contents.lines, 'works'),
    recordingsMinor: sumOfRight(contents.lines, 'recordings'),
    sections: contents.stations.map((station) => ({
      stationName: station.name,
      timeZone: station.timeZone,
      grossMinor: station.grossMinor,
      deductionsMinor: station.deductionsMinor,
      netMinor: station.netMinor,
      heldSeconds: station.heldSeconds,
      expectedSeconds: station.expectedSeconds,
      lines: contents.lines
        .filter(({ stationId }) => stationId === station.stationId)
        .map((line) => describeLine(line, contents, station.timeZone)),
    })),
    holdbacks: contents.holdbacks.map((holdback) => ({
      title: holdback.title,
      creators: holdback.artist,
      stationName: holdback.stationName,
      right: holdback.right,
      explanation: holdback.reason,
      amountMinor: holdback.amountMinor,
    })),
    questionUntil: issuedOn.plus({ days: run.questionDays }).toFormat('yyyy-LL-dd'),
    questionContact: `sign in at ${publicUrl}, open the statement and dispute the play`,
  }
}
