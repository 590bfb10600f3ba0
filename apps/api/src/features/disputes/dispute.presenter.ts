import type { EndpointResult, getDispute, listDisputes, MonthStatus } from '@fieldfare/contracts'
import type { Actor } from '@fieldfare/database'
import { canDecideDispute, canReplyToDispute } from './disputes.policy.ts'
import type { DisputeMessage, DisputeRow } from './disputes.repository.ts'

type SummaryInput = EndpointResult<typeof listDisputes>['items'][number]
type ViewInput = EndpointResult<typeof getDispute>

export function presentDispute(row: DisputeRow): SummaryInput {
  const { station, recording } = row
  return {
    id: row.id,
    number: row.number,
    status: row.status,
    detectionId: row.detectionId,
    play: { id: row.play.id, status: row.play.status },
    station: { id: station.id, callName: station.callName, name: station.name, timeZone: station.timeZone },
    recording: {
      id: recording.id,
      isrc: recording.isrc,
      title: recording.title,
      artist: recording.artist,
    },
    startedAt: row.startedAt,
    endedAt: row.endedAt,
    month: row.month,
    reason: row.reason,
    openedAt: row.openedAt,
    openedByName: row.openedByName,
    openedByRole: row.openedByRole,
    decidedAt: row.decidedAt,
    decidedByName: row.decidedByName,
  }
}

export function presentDisputeView(
  row: DisputeRow,
  messages: readonly DisputeMessage[],
  monthStatus: MonthStatus,
  actor: Pick<Actor, 'role'>,
): ViewInput {
  return {
    ...presentDispute(row),
    decisionReason: row.decisionReason,
    messages: messages.map(({ id, at, authorName, authorRole, text }) => ({
      id,
      at,
      authorName,
      authorRole,
      text,
    })),
    isMonthOpen: monthStatus === 'open',
    canReply: canReplyToDispute(row),
    canDecide: canDecideDispute(actor, row),
  }
}
