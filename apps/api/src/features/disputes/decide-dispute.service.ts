import type { DisputeId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  sendMail,
  violates,
  type Actor,
  type Transaction,
} from '@fieldfare/database'
import { AppError, conflict, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { monthClosed } from '../../records/month-closed.ts'
import { holdMonthStatus } from '../../records/month.repository.ts'
import { holdPlay, removePlay } from '../../records/play-changes.repository.ts'
import { insertMessage, lockDispute, recordDecision } from './dispute-changes.repository.ts'
import { mailOnDecision, mailOnReply } from './dispute-mail.ts'
import { disputeScopeOf } from './disputes.policy.ts'
import { findDispute, type DisputeRow } from './disputes.repository.ts'

type Parts = Pick<Dependencies, 'database' | 'configuration'>
export type Decision = { outcome: 'upheld' | 'dismissed'; reason: string }

/** The dispute, locked and still open. */
async function holdOpenDispute(trx: Transaction, actor: Actor, id: DisputeId): Promise<DisputeRow> {
  await lockDispute(trx, id)
  const dispute = await findDispute(trx, disputeScopeOf(actor), id)
  if (dispute === null) throw notFound('This dispute')
  if (dispute.status !== 'open') throw conflict(`Dispute ${dispute.number} is ${dispute.status} already.`)
  return dispute
}

/** Adds a message; what the desk writes also reaches the person who opened the dispute by mail. */
export async function replyToDispute(
  { database, configuration }: Parts,
  actor: Actor,
  id: DisputeId,
  text: string,
): Promise<void> {
  await inTransaction(database, async (trx) => {
    const dispute = await holdOpenDispute(trx, actor, id)
    await insertMessage(trx, { disputeId: id, authorId: actor.userId, text })
    if (actor.role === 'clerk') {
      const mail = mailOnReply(dispute, { authorName: actor.name, text }, configuration.publicUrl)
      await sendMail(trx, { to: dispute.openedByEmail, ...mail })
    }
    await recordAudit(trx, {
      actor,
      action: 'reply-to-dispute',
      subjectKind: 'dispute',
      subjectId: id,
      summary: `Wrote in dispute ${dispute.number}`,
    })
  })
}

async function removeDisputedPlay(
  trx: Transaction,
  actor: Actor,
  dispute: DisputeRow,
  reason: string,
): Promise<void> {
  const status = await holdMonthStatus(trx, dispute.month)
  if (status !== 'open') throw monthClosed(dispute.month, status)
  const play = await holdPlay(trx, dispute.play.id)
  // A review may have removed it meanwhile: then the dispute was right and nothing is left to do.
  if (play?.status !== 'counted') return
  await removePlay(trx, {
    playId: play.id,
    actor,
    reason: `Dispute ${dispute.number} upheld: ${reason}`,
  })
}

/** Dismisses, or upholds and takes the play out of its open month, in one transaction. */
export async function decideDispute(
  { database, configuration }: Parts,
  actor: Actor,
  id: DisputeId,
  decision: Decision,
): Promise<void> {
  try {
    await inTransaction(database, async (trx) => {
      const dispute = await holdOpenDispute(trx, actor, id)
      if (decision.outcome === 'upheld') await removeDisputedPlay(trx, actor, dispute, decision.reason)
      await recordDecision(trx, { disputeId: id, ...decision, decidedBy: actor.userId })
      const mail = mailOnDecision(dispute, decision, configuration.publicUrl)
      await sendMail(trx, { to: dispute.openedByEmail, ...mail })
      await recordAudit(trx, {
        actor,
        action: decision.outcome === 'upheld' ? 'uphold-dispute' : 'dismiss-dispute',
        subjectKind: 'dispute',
        subjectId: id,
        summary: `Dispute ${dispute.number} ${decision.outcome}: ${decision.reason}`,
      })
    })
  } catch (error) {
    if (!violates(error, 'plays_month_open')) throw error
    throw new AppError('month-closed', {
      detail: 'The month of this play was closed meanwhile. Load the page again.',
      cause: error,
    })
  }
}
