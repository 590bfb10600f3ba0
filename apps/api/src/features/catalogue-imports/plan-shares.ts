import { randomUUID } from 'node:crypto'
import {
  doubledParties,
  overclaimedPeriods,
  overclaimText,
  underclaimedPeriods,
  underclaimText,
} from '../../shares/share-rules.ts'
import type { RowShare } from './catalogue-row.ts'
import type { HeldShare } from './catalogue-state.ts'
import type { RowReport } from './row-report.ts'

/** A share a row gives, with the work or recording it is in and the party found for it. */
export type SharedRow = { line: number; share: RowShare; subject: ShareSubjectKey; partyId: string }
export type ShareSubjectKey = { workId: string; recordingId: null } | { workId: null; recordingId: string }

export type ShareChange = HeldShare & { line: number; change: 'created' | 'updated' }

function termsOf(row: SharedRow, id: string): HeldShare {
  const { sharePpm, validFrom, validTo } = row.share
  return { id, ...row.subject, partyId: row.partyId, sharePpm, validFrom, validTo }
}

const isSame = (left: HeldShare, right: HeldShare) =>
  left.sharePpm === right.sharePpm && left.validTo === right.validTo

/**
 * Lays the shares that rows give in one thing over those that are held: one party's share that begins on the same day
 * is the same share. Nothing is ever taken away by a file.
 *
 * @returns the changes; none when they would claim too much, and then all rows are refused
 */
export function planShares(
  rows: readonly SharedRow[],
  held: readonly HeldShare[],
  report: RowReport,
): ShareChange[] {
  const keyOf = (share: HeldShare) => `${share.partyId} ${share.validFrom}`
  const result = new Map(held.map((share) => [keyOf(share), share]))
  const heldKeys = new Set(result.keys())
  const lines = new Map<string, number>()
  const changes = new Map<string, ShareChange>()
  for (const row of rows) {
    const wanted = termsOf(row, randomUUID())
    const key = keyOf(wanted)
    const present = result.get(key)
    const earlierLine = lines.get(key)
    if (earlierLine !== undefined && present !== undefined) {
      if (isSame(present, wanted)) report.say(row.line, `This share stands in line ${earlierLine} already.`)
      else
        report.refuse(
          row.line,
          `This party's share from ${wanted.validFrom} differs from line ${earlierLine}.`,
        )
      continue
    }
    lines.set(key, row.line)
    if (present !== undefined && isSame(present, wanted)) continue
    const change = heldKeys.has(key) ? 'updated' : 'created'
    const changed = { ...wanted, id: present?.id ?? wanted.id, line: row.line, change } as const
    result.set(key, changed)
    changes.set(key, changed)
  }
  return judge([...result.values()], rows, [...changes.values()], report)
}

function judge(
  merged: readonly HeldShare[],
  rows: readonly SharedRow[],
  changes: ShareChange[],
  report: RowReport,
): ShareChange[] {
  const accepted = rows.filter(({ line }) => !report.isRefused(line))
  const over = overclaimedPeriods(merged)
  const complaint =
    over.length > 0
      ? `${overclaimText(over)} Shares held already are counted in.`
      : doubledParties(merged).length > 0
        ? 'One party would hold two shares on the same days; shares held already are counted in.'
        : null
  if (complaint !== null) {
    for (const { line } of accepted) report.refuse(line, complaint)
    return []
  }
  const under = underclaimedPeriods(merged)
  const last = accepted.at(-1)
  if (under.length > 0 && last !== undefined) report.say(last.line, underclaimText(under))
  return changes
}
