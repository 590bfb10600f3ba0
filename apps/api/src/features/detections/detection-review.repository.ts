import type { DetectionId, PlayId } from '@fieldfare/contracts'
import type { Actor, Transaction } from '@fieldfare/database'

export type ReviewOutcome = 'confirmed' | 'rejected'

/** Reviews of one detection happen one after the other: nobody decides on what another is deciding. */
export async function serialiseReviews(trx: Transaction, id: DetectionId): Promise<void> {
  // A detection's own row never changes, so it cannot be locked by everyone who may read it.
  await trx.raw('select pg_advisory_xact_lock(hashtextextended(?, 0))', [`review-detection-${id}`])
}

export async function insertReview(
  trx: Transaction,
  review: {
    detectionId: DetectionId
    startedAt: string
    outcome: ReviewOutcome
    reason: string
    actor: Actor
  },
): Promise<void> {
  await trx('detection_reviews').insert({
    detection_id: review.detectionId,
    detection_started_at: review.startedAt,
    outcome: review.outcome,
    reason: review.reason,
    reviewed_by: review.actor.userId,
  })
}

/**
 * The play of a detection that had none, dated in the station's zone. It ends where the airtime of its log does, so
 * that what two logs share counts once.
 *
 * @throws ConstraintViolation plays_month_open, or plays_counted_once when another play covers that airtime
 */
export async function insertPlayOfDetection(trx: Transaction, id: DetectionId): Promise<PlayId> {
  const { rows } = await trx.raw<{ rows: { id: PlayId }[] }>(
    `insert into plays
       (detection_id, detection_started_at, station_id, recording_id, started_at, ended_at, local_day)
     select detections.id, detections.started_at, detections.station_id, detections.recording_id,
       held.started_at, held.ended_at, (held.started_at at time zone stations.time_zone)::date
     from detections join stations on stations.id = detections.station_id
     join station_logs on station_logs.id = detections.log_id
     cross join lateral (
       select greatest(detections.started_at, lower(station_logs.airtime)) as started_at,
         least(detections.ended_at, upper(station_logs.airtime)) as ended_at
     ) held
     where detections.id = ?
     returning id`,
    [id],
  )
  const [row] = rows
  if (row === undefined) throw new Error('The detection to make a play of is gone')
  return row.id
}

/** Whether a clerk has once upheld a dispute against this detection's play. */
export async function hasUpheldDispute(trx: Transaction, playId: PlayId): Promise<boolean> {
  const row: { id: string } | undefined = await trx('disputes')
    .where({ play_id: playId, status: 'upheld' })
    .first('id')
  return row !== undefined
}
