import type { DisputeId, PlayId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  scopeOf,
  sendMail,
  violates,
  type Actor,
  type Transaction,
} from '@fieldfare/database'
import { describeLocal } from '../../airtime/local-time.ts'
import { conflict, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { holdPlay } from '../../records/play-changes.repository.ts'
import { findPlay, type PlayRow } from '../../records/play.repository.ts'
import {
  insertDispute,
  isOnIssuedStatement,
  listClerkAddresses,
  readEvidence,
} from './dispute-changes.repository.ts'
import { mailOnOpening } from './dispute-mail.ts'
import { findDispute } from './disputes.repository.ts'

const ALREADY_OPEN = 'This play is in dispute already.'

async function tellClerks(trx: Transaction, id: DisputeId, publicUrl: string): Promise<number> {
  const dispute = await findDispute(trx, { kind: 'all' }, id)
  if (dispute === null) throw new Error('The new dispute is not to be found')
  const mail = mailOnOpening(dispute, publicUrl)
  for (const to of await listClerkAddresses(trx)) await sendMail(trx, { to, ...mail })
  return dispute.number
}

/** A publisher may question every line of their statements, also when a share was corrected since. */
async function findDisputablePlay(trx: Transaction, actor: Actor, id: PlayId): Promise<PlayRow | null> {
  const play = await findPlay(trx, scopeOf(actor), id)
  if (play !== null || actor.role !== 'publisher') return play
  const isTheirs = await isOnIssuedStatement(trx, actor.partyIds, id)
  return isTheirs ? findPlay(trx, { kind: 'all' }, id) : null
}

/** Opens a dispute on a counted play of the actor's scope, freezing the facts as they stand. */
export async function openDispute(
  { database, configuration }: Pick<Dependencies, 'database' | 'configuration'>,
  actor: Actor,
  request: { playId: PlayId; reason: string },
): Promise<DisputeId> {
  try {
    return await inTransaction(database, async (trx) => {
      await holdPlay(trx, request.playId)
      const play = await findDisputablePlay(trx, actor, request.playId)
      if (play === null) throw notFound('This play')
      if (play.openDisputeId !== null) throw conflict(ALREADY_OPEN)
      if (play.status !== 'counted')
        throw conflict('This play is not counted, so there is nothing to dispute.')
      const evidence = await readEvidence(trx, play)
      const id = await insertDispute(trx, { ...request, evidence, openedBy: actor.userId })
      const number = await tellClerks(trx, id, configuration.publicUrl)
      await recordAudit(trx, {
        actor,
        action: 'open-dispute',
        subjectKind: 'dispute',
        subjectId: id,
        summary: `Opened dispute ${number} on “${play.recording.title}” on ${play.station.callName} at ${describeLocal(play.startedAt, play.station.timeZone)} (${play.station.timeZone})`,
      })
      return id
    })
  } catch (error) {
    if (violates(error, 'disputes_open_once')) throw conflict(ALREADY_OPEN)
    throw error
  }
}
