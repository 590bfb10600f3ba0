import { DateTime } from 'luxon'
import type { DisputeRow } from './disputes.repository.ts'

type Mail = { subject: string; text: string }
type Dispute = Pick<DisputeRow, 'id' | 'number' | 'station' | 'recording' | 'startedAt'>

/** The moment as the station had it. */
function localMoment({ startedAt, station }: Dispute): string {
  const moment = DateTime.fromISO(startedAt, { zone: station.timeZone, locale: 'en' })
  return `${moment.toFormat('d LLLL yyyy, HH:mm:ss')} (${station.timeZone})`
}

function describePlay(dispute: Dispute): string {
  const { recording, station } = dispute
  return `“${recording.title}” by ${recording.artist}\n${station.name}, ${localMoment(dispute)}`
}

function compose(dispute: Dispute, subject: string, paragraphs: readonly string[], publicUrl: string): Mail {
  const address = `${publicUrl}/disputes/${dispute.id}`
  return { subject, text: `${[describePlay(dispute), ...paragraphs, address].join('\n\n')}\n` }
}

export function mailOnOpening(dispute: DisputeRow, publicUrl: string): Mail {
  return compose(
    dispute,
    `Dispute ${dispute.number} opened`,
    [`${dispute.openedByName} disputes this play:`, dispute.reason],
    publicUrl,
  )
}

export function mailOnReply(
  dispute: DisputeRow,
  reply: { authorName: string; text: string },
  publicUrl: string,
): Mail {
  return compose(
    dispute,
    `Dispute ${dispute.number}: a reply`,
    [`${reply.authorName} writes about the dispute you opened:`, reply.text],
    publicUrl,
  )
}

export function mailOnDecision(
  dispute: DisputeRow,
  decision: { outcome: 'upheld' | 'dismissed'; reason: string },
  publicUrl: string,
): Mail {
  const consequence =
    decision.outcome === 'upheld'
      ? 'The dispute you opened was upheld: the play is no longer counted.'
      : 'The dispute you opened was dismissed: the play stays counted.'
  return compose(
    dispute,
    `Dispute ${dispute.number} ${decision.outcome}`,
    [consequence, decision.reason],
    publicUrl,
  )
}
