import type { Instant } from '@fieldfare/contracts'
import type { Database, Transaction } from '../connection.ts'
import { containsPattern, fetchPage, type PageRequest, type PageResult } from '../paging.ts'
import type { Actor } from '../scope.ts'

/** What was done to what, in words that make sense years later. */
export type AuditEntry = {
  /** The person; null when the system did it by itself. */
  actor: Pick<Actor, 'userId' | 'name'> | null
  /** A verb phrase in kebab-case: `close-month`. */
  action: string
  /** The trade's noun in kebab-case: `distribution`. */
  subjectKind: string
  subjectId: string
  /** One sentence, without personal or bank data. */
  summary: string
}

export type AuditRecord = {
  id: string
  at: Instant
  actorName: string
  action: string
  subjectKind: string
  subjectId: string
  summary: string
}

/** Adds to the audit trail in the transaction that does what it tells of: both happen or neither. */
export async function recordAudit(trx: Transaction, entry: AuditEntry): Promise<void> {
  await trx('audit_events').insert({
    actor_user_id: entry.actor?.userId ?? null,
    actor_name: entry.actor?.name ?? 'System',
    action: entry.action,
    subject_kind: entry.subjectKind,
    subject_id: entry.subjectId,
    summary: entry.summary,
  })
}

export type AuditFilter = PageRequest & {
  subjectKind?: string | undefined
  subjectId?: string | undefined
  search?: string | undefined
}

/** The trail, newest first. */
export async function listAuditEvents(
  database: Database,
  filter: AuditFilter,
): Promise<PageResult<AuditRecord>> {
  const query = database('audit_events')
    .select<AuditRecord[]>(
      {
        at: 'at',
        actorName: 'actor_name',
        action: 'action',
        subjectKind: 'subject_kind',
        subjectId: 'subject_id',
        summary: 'summary',
      },
      database.raw('audit_events.id::text as id'),
    )
    .orderBy('audit_events.id', 'desc')
  const { subjectKind, subjectId, search } = filter
  if (subjectKind !== undefined) query.where({ subject_kind: subjectKind })
  if (subjectId !== undefined) query.where({ subject_id: subjectId })
  if (search !== undefined && search !== '') {
    const pattern = containsPattern(search)
    query.where((match) =>
      match
        .whereILike('summary', pattern)
        .orWhereILike('actor_name', pattern)
        .orWhereILike('action', pattern),
    )
  }
  return fetchPage<AuditRecord>(database, query, filter)
}
