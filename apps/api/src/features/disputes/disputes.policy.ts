import type { Actor } from '@fieldfare/database'
import type { DisputeRow, DisputeScope } from './disputes.repository.ts'

export function disputeScopeOf(actor: Pick<Actor, 'role' | 'userId'>): DisputeScope {
  return actor.role === 'clerk' || actor.role === 'auditor'
    ? { kind: 'all' }
    : { kind: 'opened-by', userId: actor.userId }
}

/** Whoever sees an open dispute may add to it. */
export function canReplyToDispute(dispute: Pick<DisputeRow, 'status'>): boolean {
  return dispute.status === 'open'
}

export function canDecideDispute(actor: Pick<Actor, 'role'>, dispute: Pick<DisputeRow, 'status'>): boolean {
  return actor.role === 'clerk' && dispute.status === 'open'
}
