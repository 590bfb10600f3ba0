import { formatPlainAmount } from '@fieldfare/royalty'
import { stringify } from 'csv-stringify/sync'
import { checkStatement } from './check-statement.ts'
import { numberPlays } from './number-plays.ts'
import { type StatementDocument } from './statement-document.ts'
import { formatPercentFigure, nameRight } from './statement-words.ts'

const COLUMNS = [
  'record',
  'statement',
  'status',
  'payee',
  'ipi',
  'month',
  'currency',
  'station',
  'right',
  'title',
  'creators',
  'code',
  'detail',
  'plays',
  'play_numbers',
  'local_start',
  'time_zone',
  'duration_seconds',
  'credited_seconds',
  'percent',
  'amount',
] as const

type Row = Partial<Record<(typeof COLUMNS)[number], string>>

/**
 * Text that a spreadsheet would take for a formula gets an apostrophe in front, which makes it text again (OWASP,
 * "CSV Injection"). Only text cells pass through here: figures are ours, and a negative amount must stay a number.
 */
function neutralise(text: string): string {
  return /^\s*[=+\-@\uff1d\uff0b\uff0d\uff20]|^[\t\r\n]/.test(text) ? `'${text}` : text
}

/**
 * The statement as one table (RFC 4180: CRLF, quotes where needed) in UTF-8 with a byte order mark, because common
 * spreadsheet programs read a file without one in the local eight-bit set and garble names.
 *
 * `record` says what a row is: `gross`, `deduction` (negative) and `net` add up; `station` and `line` rows each sum to
 * `net`; `holdback` rows are not part of it; `play` rows carry no amount. Amounts have the currency's decimals, a
 * point, and an ASCII hyphen when negative.
 *
 * @throws RoyaltyError `not-closed` when the statement does not add up
 */
export function renderStatementCsv(statement: StatementDocument): string {
  checkStatement(statement)
  const head: Row = {
    statement: neutralise(statement.statementNumber),
    status: statement.status,
    payee: neutralise(statement.payeeName),
    ipi: statement.ipiNameNumber ?? '',
    month: statement.firstDay.slice(0, 7),
    currency: statement.currency,
  }
  const rows = [
    ...totalRows(statement),
    ...stationRows(statement),
    ...lineRows(statement),
    ...holdbackRows(statement),
    ...playRows(statement),
  ].map((row) => ({ ...head, ...row }))
  return stringify(rows, { header: true, columns: [...COLUMNS], record_delimiter: 'windows', bom: true })
}

function totalRows(statement: StatementDocument): Row[] {
  const amountOf = (amountMinor: bigint): string => formatPlainAmount(amountMinor, statement.currency)
  return [
    { record: 'gross', amount: amountOf(statement.grossMinor) },
    ...statement.deductions.map(({ label, ratePpm, amountMinor }) => ({
      record: 'deduction',
      detail: neutralise(label),
      percent: formatPercentFigure(ratePpm),
      amount: amountOf(-amountMinor),
    })),
    { record: 'net', amount: amountOf(statement.netMinor) },
  ]
}

function stationRows(statement: StatementDocument): Row[] {
  return statement.sections.map(({ stationName, timeZone, heldSeconds, expectedSeconds, netMinor }) => ({
    record: 'station',
    station: neutralise(stationName),
    time_zone: timeZone,
    detail: `logs held ${Math.round(heldSeconds)} of ${Math.round(expectedSeconds)} seconds`,
    amount: formatPlainAmount(netMinor, statement.currency),
  }))
}

function lineRows(statement: StatementDocument): Row[] {
  const numbers = numberPlays(statement)
  return statement.sections.flatMap(({ stationName, lines }) =>
    lines.map((line) => ({
      record: 'line',
      station: neutralise(stationName),
      right: nameRight(line.right),
      title: neutralise(line.title),
      creators: neutralise(line.creators),
      code: neutralise(line.code ?? ''),
      plays: `${line.plays.length}`,
      play_numbers: numbers.of(line).join(' '),
      credited_seconds: formatSeconds(line.creditedMs),
      percent: formatPercentFigure(line.sharePpm),
      amount: formatPlainAmount(line.amountMinor, statement.currency),
    })),
  )
}

function holdbackRows(statement: StatementDocument): Row[] {
  return statement.holdbacks.map((holdback) => ({
    record: 'holdback',
    station: neutralise(holdback.stationName),
    right: nameRight(holdback.right),
    title: neutralise(holdback.title),
    creators: neutralise(holdback.creators),
    detail: neutralise(holdback.explanation),
    amount: formatPlainAmount(holdback.amountMinor, statement.currency),
  }))
}

function playRows(statement: StatementDocument): Row[] {
  return numberPlays(statement).plays.map((play) => ({
    record: 'play',
    station: neutralise(play.stationName),
    title: neutralise(play.recordingTitle),
    detail: neutralise(play.reference),
    play_numbers: `${play.number}`,
    local_start: play.localStart,
    time_zone: play.timeZone,
    duration_seconds: formatSeconds(BigInt(Math.round(play.durationSeconds * 1000))),
    credited_seconds: formatSeconds(BigInt(Math.round(play.creditedSeconds * 1000))),
  }))
}

/** Milliseconds as seconds with three decimals, without passing through floating point. */
function formatSeconds(milliseconds: bigint): string {
  return `${milliseconds / 1000n}.${(milliseconds % 1000n).toString().padStart(3, '0')}`
}
