import type { EndpointResult, getDetection, listDetections, MonthStatus } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import { z } from 'zod'
import { canDisputePlay } from '../../records/play-view.ts'
import type { DetectionHistory } from './detection-history.repository.ts'
import { canReviewDetection, maySeeDisputes } from './detections.policy.ts'
import type { DetectionEvidenceRow, DetectionRow } from './detections.repository.ts'

type DetectionViewInput = EndpointResult<typeof listDetections>['items'][number]
type DetectionDetailInput = EndpointResult<typeof getDetection>
type HistoryEntry = DetectionDetailInput['history'][number]

const evidenceSchema = z.array(z.object({ logSeconds: z.number(), referenceSeconds: z.number() }))

const playEventWords = {
  created: 'Play counted',
  removed: 'Play removed',
  restored: 'Play counted again',
} as const

export function presentDetection(row: DetectionRow, actor: Pick<Actor, 'role'>): DetectionViewInput {
  const { station, recording } = row
  return {
    id: row.id,
    station: { id: station.id, callName: station.callName, name: station.name, timeZone: station.timeZone },
    logId: row.logId,
    recording: {
      id: recording.id,
      isrc: recording.isrc,
      title: recording.title,
      artist: recording.artist,
    },
    startedAt: row.startedAt,
    endedAt: row.endedAt,
    durationSeconds: row.durationSeconds,
    confidence: row.confidence,
    expectedFalseAlarms: row.expectedFalseAlarms,
    decision: row.decision,
    reviewState: row.reviewState,
    play: row.play === null ? null : { id: row.play.id, status: row.play.status },
    openDisputeId: maySeeDisputes(actor) ? row.openDisputeId : null,
  }
}

function reasonOrNull(reason: string | null): string | null {
  return reason === '' ? null : reason
}

function disputeEntries({ disputes }: DetectionHistory): HistoryEntry[] {
  return disputes.flatMap((dispute) => {
    const opened = {
      at: dispute.openedAt,
      actorName: dispute.openedByName,
      what: `Dispute ${dispute.number} opened`,
      reason: dispute.reason,
    }
    if (dispute.decidedAt === null || dispute.decidedByName === null) return [opened]
    return [
      opened,
      {
        at: dispute.decidedAt,
        actorName: dispute.decidedByName,
        what: `Dispute ${dispute.number} ${dispute.status}`,
        reason: dispute.decisionReason,
      },
    ]
  })
}

/** Everything that happened, oldest first. */
function presentHistory(
  row: DetectionEvidenceRow,
  history: DetectionHistory,
  actor: Pick<Actor, 'role'>,
): HistoryEntry[] {
  const entries: HistoryEntry[] = [
    {
      at: row.foundAt,
      actorName: `Engine ${row.engineVersion}`,
      what: row.decision === 'accept' ? 'Found and accepted' : 'Found, to be reviewed',
      reason: null,
    },
    ...history.plays.map(({ at, actorName, kind, reason }) => ({
      at,
      actorName,
      what: playEventWords[kind],
      reason: reasonOrNull(reason),
    })),
    ...history.reviews.map(({ at, actorName, outcome, reason }) => ({
      at,
      actorName,
      what: outcome === 'confirmed' ? 'Detection confirmed' : 'Detection rejected',
      reason: reasonOrNull(reason),
    })),
    ...(maySeeDisputes(actor) ? disputeEntries(history) : []),
  ]
  return entries.sort((left, right) => left.at.localeCompare(right.at))
}

export function presentDetectionDetail(
  row: DetectionEvidenceRow,
  history: DetectionHistory,
  monthStatus: MonthStatus,
  actor: Pick<Actor, 'role'>,
): DetectionDetailInput {
  const isMonthOpen = monthStatus === 'open'
  return {
    ...presentDetection(row, actor),
    logStartSeconds: row.logStartSeconds,
    referenceStartSeconds: row.referenceStartSeconds,
    speedRatio: row.speedRatio,
    agreeingHashes: row.agreeingHashes,
    engineVersion: row.engineVersion,
    evidence: evidenceSchema.parse(row.evidence),
    hasReferenceAudio: row.hasReferenceAudio,
    history: presentHistory(row, history, actor),
    disputes: maySeeDisputes(actor)
      ? history.disputes.map(({ id, status, openedAt }) => ({ id, status, openedAt }))
      : [],
    isMonthOpen,
    canReview: canReviewDetection(actor, isMonthOpen),
    canDispute:
      row.play !== null &&
      canDisputePlay(actor, { status: row.play.status, openDisputeId: row.openDisputeId }),
  }
}
