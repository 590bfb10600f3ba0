import type { PlayId, PlayStatus } from '@fieldfare/contracts'
import type { Actor, Transaction } from '@fieldfare/database'

/** A play's standing, with its row locked until the transaction ends. */
export type HeldPlay = { id: PlayId; status: PlayStatus; localDay: string }

export async function holdPlay(trx: Transaction, id: PlayId): Promise<HeldPlay | null> {
  const row: HeldPlay | undefined = await trx('plays')
    .where({ id })
    .forUpdate()
    .first('id', 'status', { localDay: 'local_day' })
  return row ?? null
}

type PlayChange = { playId: PlayId; actor: Actor; reason: string | null }

async function recordPlayEvent(
  trx: Transaction,
  kind: 'created' | 'removed' | 'restored',
  change: PlayChange,
): Promise<void> {
  await trx('play_events').insert({
    play_id: change.playId,
    kind,
    actor_user_id: change.actor.userId,
    actor_name: change.actor.name,
    reason: change.reason,
  })
}

/**
 * Takes a counted play out of its month, keeping the row and the reason.
 *
 * @throws ConstraintViolation plays_month_open when the month is not open
 */
export async function removePlay(trx: Transaction, change: PlayChange): Promise<void> {
  await trx('plays').where({ id: change.playId }).update({ status: 'removed' })
  await recordPlayEvent(trx, 'removed', change)
}

/**
 * Counts a removed play again.
 *
 * @throws ConstraintViolation plays_month_open, or plays_counted_once when another play covers that airtime
 */
export async function restorePlay(trx: Transaction, change: PlayChange): Promise<void> {
  await trx('plays').where({ id: change.playId }).update({ status: 'counted' })
  await recordPlayEvent(trx, 'restored', change)
}

/** Writes down that a play was made; call it in the transaction that inserts the play. */
export async function recordPlayCreated(trx: Transaction, change: PlayChange): Promise<void> {
  await recordPlayEvent(trx, 'created', change)
}
