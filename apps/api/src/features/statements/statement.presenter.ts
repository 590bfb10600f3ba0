import type {
  EndpointResult,
  getStatement,
  listStatementLines,
  listStatements,
  Right,
} from '@fieldfare/contracts'
import { daysOfMonth } from '../../records/months.ts'
import type { StationReference } from '../../records/references.ts'
import type { StatementLineRow, StatementParts } from './statement-parts.repository.ts'
import type { StatementRow } from './statements.repository.ts'

type SummaryInput = EndpointResult<typeof listStatements>['items'][number]
type ViewInput = EndpointResult<typeof getStatement>
type LineInput = EndpointResult<typeof listStatementLines>['items'][number]

const rightsInOrder: readonly Right[] = ['works', 'recordings']

/** Milliseconds of a month are far below 2^53. */
function seconds(milliseconds: bigint): number {
  return Number(milliseconds) / 1000
}

function presentStation(station: StationReference): LineInput['station'] {
  const { id, callName, name, timeZone } = station
  return { id, callName, name, timeZone }
}

export function presentStatement(row: StatementRow): SummaryInput {
  return {
    id: row.id,
    number: row.number,
    month: row.month,
    party: { id: row.partyId, name: row.partyName, ipi: row.partyIpi },
    currency: row.currency,
    currencyDigits: row.currencyDigits,
    netMinor: row.netMinor.toString(),
    status: row.isIssued ? 'issued' : 'draft',
    issuedAt: row.issuedAt,
    hasPdf: row.isIssued && row.hasPdf,
  }
}

export function presentStatementView(row: StatementRow, parts: StatementParts): ViewInput {
  const days = daysOfMonth(row.month)
  return {
    ...presentStatement(row),
    periodFrom: days.firstDay,
    periodTo: days.lastDay,
    ruleVersion: row.ruleVersion,
    grossMinor: row.grossMinor.toString(),
    deductions: parts.deductions.map(({ code, label, ratePpm, amountMinor }) => ({
      code,
      label,
      ratePpm,
      amountMinor: amountMinor.toString(),
    })),
    rights: rightsInOrder.map((right) => ({
      right,
      netMinor: (parts.rights.find((part) => part.right === right)?.netMinor ?? 0n).toString(),
    })),
    stations: parts.stations.map(({ station, netMinor, heldMs, expectedMs }) => ({
      station: presentStation(station),
      netMinor: netMinor.toString(),
      heldSeconds: seconds(heldMs),
      expectedSeconds: seconds(expectedMs),
    })),
    holdbacks: parts.holdbacks.map(({ station, right, subject, reasonCode, reason, amountMinor }) => ({
      station: presentStation(station),
      right,
      subject,
      reasonCode,
      reason,
      amountMinor: amountMinor.toString(),
    })),
    lines: parts.lines,
  }
}

export function presentStatementLine(row: StatementLineRow): LineInput {
  return {
    lineNumber: row.lineNumber,
    right: row.right,
    station: presentStation(row.station),
    title: row.title,
    artist: row.artist,
    code: row.code,
    plays: row.plays,
    creditedSeconds: seconds(row.creditedMs),
    sharePpm: row.sharePpm,
    amountMinor: row.amountMinor.toString(),
  }
}
