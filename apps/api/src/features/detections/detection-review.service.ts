import type { DetectionId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  scopeOf,
  violates,
  type Actor,
  type Database,
  type Transaction,
} from '@fieldfare/database'
import { AppError, conflict, fieldRefused, notFound } from '../../http/app-error.ts'
import { monthClosed } from '../../records/month-closed.ts'
import { holdMonthStatus, monthOfDay } from '../../records/month.repository.ts'
import {
  holdPlay,
  recordPlayCreated,
  removePlay,
  restorePlay,
} from '../../records/play-changes.repository.ts'
import {
  hasUpheldDispute,
  insertPlayOfDetection,
  insertReview,
  serialiseReviews,
  type ReviewOutcome,
} from './detection-review.repository.ts'
import { findDetection, type DetectionEvidenceRow } from './detections.repository.ts'

export type Review = { outcome: ReviewOutcome; reason: string }

async function confirmPlay(
  trx: Transaction,
  detection: DetectionEvidenceRow,
  actor: Actor,
  review: Review,
): Promise<void> {
  const reason = review.reason === '' ? null : review.reason
  if (detection.play === null) {
    const playId = await insertPlayOfDetection(trx, detection.id)
    await recordPlayCreated(trx, { playId, actor, reason })
    return
  }
  const play = await holdPlay(trx, detection.play.id)
  if (play?.status !== 'removed') return
  if (reason === null && (await hasUpheldDispute(trx, play.id))) {
    throw fieldRefused('reason', 'A dispute against this play was upheld. Say why it counts after all.')
  }
  await restorePlay(trx, { playId: play.id, actor, reason })
}

async function rejectPlay(
  trx: Transaction,
  detection: DetectionEvidenceRow,
  actor: Actor,
  review: Review,
): Promise<void> {
  if (detection.play === null) return
  const play = await holdPlay(trx, detection.play.id)
  if (play?.status === 'counted') await removePlay(trx, { playId: play.id, actor, reason: review.reason })
}

/** The same answer twice changes nothing, unless the play meanwhile stands otherwise. */
function isRepeated(detection: DetectionEvidenceRow, outcome: ReviewOutcome): boolean {
  if (detection.reviewState !== outcome) return false
  return outcome === 'confirmed' ? detection.play?.status === 'counted' : detection.play?.status !== 'counted'
}

async function review(trx: Transaction, actor: Actor, id: DetectionId, decision: Review): Promise<void> {
  await serialiseReviews(trx, id)
  const detection = await findDetection(trx, scopeOf(actor), id)
  if (detection === null) throw notFound('This detection')
  if (isRepeated(detection, decision.outcome)) {
    throw conflict(`This detection is ${decision.outcome} already.`)
  }
  const month = monthOfDay(detection.localDay)
  const status = await holdMonthStatus(trx, month)
  if (status !== 'open') throw monthClosed(month, status)
  await insertReview(trx, { detectionId: id, startedAt: detection.startedAt, ...decision, actor })
  if (decision.outcome === 'confirmed') await confirmPlay(trx, detection, actor, decision)
  else await rejectPlay(trx, detection, actor, decision)
  await recordAudit(trx, {
    actor,
    action: decision.outcome === 'confirmed' ? 'confirm-detection' : 'reject-detection',
    subjectKind: 'detection',
    subjectId: id,
    summary: `${decision.outcome === 'confirmed' ? 'Confirmed' : 'Rejected'} “${detection.recording.title}” on ${detection.station.callName} at ${detection.startedAt}`,
  })
}

function inWords(error: unknown): unknown {
  if (violates(error, 'plays_month_open')) {
    return new AppError('month-closed', {
      detail: 'The month was closed meanwhile. Return it to open before reviewing its detections.',
      cause: error,
    })
  }
  if (violates(error, 'plays_counted_once')) {
    return conflict(
      'Another play of this recording on this station is counted for the same airtime. Reject that one first.',
    )
  }
  return error
}

/** Confirms or rejects a detection: the detection stays as it is, its play is counted or removed. */
export async function reviewDetection(
  database: Database,
  actor: Actor,
  id: DetectionId,
  decision: Review,
): Promise<void> {
  try {
    await inTransaction(database, (trx) => review(trx, actor, id, decision))
  } catch (error) {
    throw inWords(error)
  }
}
