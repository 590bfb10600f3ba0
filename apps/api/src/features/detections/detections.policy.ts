import type { Actor } from '@fieldfare/database'

export function canReviewDetection(actor: Pick<Actor, 'role'>, isMonthOpen: boolean): boolean {
  return actor.role === 'clerk' && isMonthOpen
}

/** Uploaders deliver logs; what others dispute is not theirs to read. */
export function maySeeDisputes(actor: Pick<Actor, 'role'>): boolean {
  return actor.role !== 'uploader'
}
