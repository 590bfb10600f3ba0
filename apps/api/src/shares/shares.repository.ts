import type { LocalDate, PartyId, RecordingId, ShareId, WorkId } from '@fieldfare/contracts'
import type { Connection, Transaction } from '@fieldfare/database'

/** What a share is held in. */
export type ShareSubject = { kind: 'work'; id: WorkId } | { kind: 'recording'; id: RecordingId }

export type NewShare = {
  partyId: PartyId
  sharePpm: number
  validFrom: LocalDate
  validTo: LocalDate | null
}

export type ShareRecord = {
  id: ShareId
  party: { id: PartyId; name: string }
  sharePpm: number
  validFrom: LocalDate
  validTo: LocalDate | null
}

/** The shares of a row of `works` or `recordings`, for queries that select from them. */
export function sharesSql(
  column: 'work_id' | 'recording_id',
  subjectId: 'works.id' | 'recordings.id',
): string {
  return `coalesce((
    select jsonb_agg(jsonb_build_object('id', shares.id, 'party', jsonb_build_object('id', parties.id, 'name', parties.name),
      'sharePpm', shares.share_ppm, 'validFrom', shares.valid_from, 'validTo', shares.valid_to)
      order by shares.valid_from desc, shares.share_ppm desc, parties.name, shares.id)
    from shares join parties on parties.id = shares.party_id
    where shares.${column} = ${subjectId}), '[]') as shares`
}

function subjectColumns(subject: ShareSubject) {
  return subject.kind === 'work' ? { work_id: subject.id } : { recording_id: subject.id }
}

export async function listShares(connection: Connection, subject: ShareSubject): Promise<ShareRecord[]> {
  return connection('shares')
    .join('parties', 'parties.id', 'shares.party_id')
    .where(subjectColumns(subject))
    .orderBy([{ column: 'valid_from' }, { column: 'parties.name' }, { column: 'shares.id' }])
    .select<ShareRecord[]>(
      { id: 'shares.id', sharePpm: 'share_ppm', validFrom: 'valid_from', validTo: 'valid_to' },
      connection.raw("jsonb_build_object('id', parties.id, 'name', parties.name) as party"),
    )
}

/**
 * Replaces the shares of one thing. Those that stay as they are keep their id. Lock the work or recording first.
 *
 * @throws ConstraintViolation shares_party_fkey for a party that is gone
 */
export async function replaceShares(
  trx: Transaction,
  subject: ShareSubject,
  present: readonly ShareRecord[],
  shares: readonly NewShare[],
): Promise<void> {
  const wanted = new Map(shares.map((share) => [termsKey(share), share]))
  const obsolete = present.filter((share) => !wanted.delete(termsKey({ ...share, partyId: share.party.id })))
  if (obsolete.length > 0)
    await trx('shares')
      .whereIn(
        'id',
        obsolete.map(({ id }) => id),
      )
      .delete()
  if (wanted.size === 0) return
  await trx('shares').insert(
    [...wanted.values()].map((share) => ({
      ...subjectColumns(subject),
      party_id: share.partyId,
      share_ppm: share.sharePpm,
      valid_from: share.validFrom,
      valid_to: share.validTo,
    })),
  )
}

function termsKey(share: NewShare): string {
  return [share.partyId, share.sharePpm, share.validFrom, share.validTo ?? ''].join(' ')
}

/** Names of those of the parties that exist. */
export async function readPartyNames(
  connection: Connection,
  ids: readonly PartyId[],
): Promise<Map<PartyId, string>> {
  const rows: { id: PartyId; name: string }[] = await connection('parties')
    .whereIn('id', [...ids])
    .select('id', 'name')
  return new Map(rows.map(({ id, name }) => [id, name]))
}
