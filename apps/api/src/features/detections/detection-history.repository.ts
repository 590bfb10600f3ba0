import type { DetectionId, DisputeId, DisputeStatus, Instant } from '@fieldfare/contracts'
import type { Connection } from '@fieldfare/database'

export type ReviewEvent = {
  at: Instant
  actorName: string
  outcome: 'confirmed' | 'rejected'
  reason: string
}
export type PlayEvent = {
  at: Instant
  actorName: string
  kind: 'created' | 'removed' | 'restored'
  reason: string | null
}
export type DisputeRecord = {
  id: DisputeId
  number: number
  status: DisputeStatus
  reason: string
  openedAt: Instant
  openedByName: string
  decidedAt: Instant | null
  decidedByName: string | null
  decisionReason: string | null
}

/** All that happened to a detection that the caller has found in scope. */
export type DetectionHistory = { reviews: ReviewEvent[]; plays: PlayEvent[]; disputes: DisputeRecord[] }

export async function readDetectionHistory(
  connection: Connection,
  id: DetectionId,
): Promise<DetectionHistory> {
  const reviews: ReviewEvent[] = await connection('detection_reviews')
    .join('users', 'users.id', 'detection_reviews.reviewed_by')
    .where('detection_reviews.detection_id', id)
    .orderBy('detection_reviews.id')
    .select({
      at: 'detection_reviews.reviewed_at',
      actorName: 'users.name',
      outcome: 'detection_reviews.outcome',
      reason: 'detection_reviews.reason',
    })
  const plays: PlayEvent[] = await connection('play_events')
    .join('plays', 'plays.id', 'play_events.play_id')
    .where('plays.detection_id', id)
    .orderBy('play_events.id')
    .select({
      at: 'play_events.at',
      actorName: 'play_events.actor_name',
      kind: 'play_events.kind',
      reason: 'play_events.reason',
    })
  const disputes: DisputeRecord[] = await connection('disputes')
    .join('plays', 'plays.id', 'disputes.play_id')
    .join('users as opener', 'opener.id', 'disputes.opened_by')
    .leftJoin('users as decider', 'decider.id', 'disputes.decided_by')
    .where('plays.detection_id', id)
    .orderBy('disputes.number')
    .select({
      id: 'disputes.id',
      number: 'disputes.number',
      status: 'disputes.status',
      reason: 'disputes.reason',
      openedAt: 'disputes.opened_at',
      openedByName: 'opener.name',
      decidedAt: 'disputes.decided_at',
      decidedByName: 'decider.name',
      decisionReason: 'disputes.decision_reason',
    })
  return { reviews, plays, disputes }
}
