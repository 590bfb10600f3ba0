import type { PartyId } from '@fieldfare/contracts'
import { inTransaction, recordAudit, type Actor, type Database, type Transaction } from '@fieldfare/database'
import { validationFailed } from '../../http/app-error.ts'
import { percentText, periodText, shareComplaints } from '../../shares/share-rules.ts'
import {
  listShares,
  readPartyNames,
  replaceShares,
  type NewShare,
  type ShareSubject,
} from '../../shares/shares.repository.ts'

export type SharesInput = { shares: readonly NewShare[]; acceptIncomplete: boolean }

/**
 * Replaces the shares of a work or recording. Months that are calculated already keep the shares they were calculated
 * with, so past days may be corrected.
 *
 * @param lockSubject - locks the row and names it as in a sentence
 */
export async function setShares(
  database: Database,
  actor: Actor,
  subject: ShareSubject,
  { shares, acceptIncomplete }: SharesInput,
  lockSubject: (trx: Transaction) => Promise<string>,
): Promise<void> {
  const complaints = shareComplaints(shares, acceptIncomplete)
  await inTransaction(database, async (trx) => {
    const name = await lockSubject(trx)
    const partyNames = await readPartyNames(
      trx,
      shares.map(({ partyId }) => partyId),
    )
    const unknown = shares.flatMap(({ partyId }, index) =>
      partyNames.has(partyId)
        ? []
        : [{ path: `shares.${index}.partyId`, message: 'This party does not exist.' }],
    )
    if (unknown.length + complaints.length > 0) throw validationFailed([...unknown, ...complaints])
    const present = await listShares(trx, subject)
    const before = describe(present.map((share) => ({ ...share, name: share.party.name })))
    const after = describe(shares.map((share) => ({ ...share, name: nameOf(partyNames, share.partyId) })))
    if (before === after) return
    await replaceShares(trx, subject, present, shares)
    await recordAudit(trx, {
      actor,
      action: 'set-shares',
      subjectKind: subject.kind,
      subjectId: subject.id,
      summary: `Changed the shares of ${name}. Before: ${before}. After: ${after}.`,
    })
  })
}

function nameOf(partyNames: ReadonlyMap<PartyId, string>, id: PartyId): string {
  return partyNames.get(id) ?? id
}

function describe(shares: readonly (Omit<NewShare, 'partyId'> & { name: string })[]): string {
  if (shares.length === 0) return 'none'
  return shares
    .map(({ name, sharePpm, validFrom, validTo }) => {
      return `${name} ${percentText(sharePpm)} % ${periodText({ from: validFrom, to: validTo })}`
    })
    .sort()
    .join('; ')
}
