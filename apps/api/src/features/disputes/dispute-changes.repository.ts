import type { DisputeId, PartyId, PlayId, UserId } from '@fieldfare/contracts'
import type { Connection, Transaction } from '@fieldfare/database'
import type { PlayRow } from '../../records/play.repository.ts'

/** Locks a dispute, so that it is answered and decided one after the other. */
export async function lockDispute(trx: Transaction, id: DisputeId): Promise<void> {
  await trx('disputes').where({ id }).forUpdate().select('id')
}

/** Whether a statement issued to one of the parties pays for the play. */
export async function isOnIssuedStatement(
  trx: Transaction,
  partyIds: readonly PartyId[],
  playId: PlayId,
): Promise<boolean> {
  const row: { id: string } | undefined = await trx('statement_line_plays')
    .join('statements', 'statements.id', 'statement_line_plays.statement_id')
    .join('distributions', 'distributions.id', 'statements.distribution_id')
    .where({ 'statement_line_plays.play_id': playId, 'distributions.status': 'issued' })
    .whereIn('statements.party_id', [...partyIds])
    .first('statements.id')
  return row !== undefined
}

/** What a play's claim rests on, beside the play: the detection's figures and the shares of its day. */
export async function readEvidence(trx: Transaction, play: PlayRow): Promise<Record<string, unknown>> {
  const { rows } = await trx.raw<{ rows: { detection: unknown; shares: unknown }[] }>(
    `select
       (select jsonb_build_object('id', id, 'logId', log_id, 'engineVersion', engine_version,
          'logStartMs', log_start_ms, 'logEndMs', log_end_ms, 'referenceStartMs', reference_start_ms,
          'speedRatio', speed_ratio, 'confidence', confidence, 'expectedFalseAlarms', expected_false_alarms,
          'decision', decision, 'agreeingHashes', agreeing_hashes)
        from detections where id = plays.detection_id and started_at = plays.detection_started_at) as detection,
       (select coalesce(jsonb_agg(jsonb_build_object('partyId', shares.party_id, 'partyName', parties.name,
          'right', case when shares.work_id is null then 'recordings' else 'works' end,
          'sharePpm', shares.share_ppm) order by parties.name, shares.id), '[]')
        from shares join parties on parties.id = shares.party_id
        where (shares.recording_id = plays.recording_id or shares.work_id = recordings.work_id)
          and shares.valid_from <= plays.local_day
          and (shares.valid_to is null or shares.valid_to >= plays.local_day)) as shares
     from plays join recordings on recordings.id = plays.recording_id
     where plays.id = ?`,
    [play.id],
  )
  const [facts] = rows
  return {
    play: {
      id: play.id,
      startedAt: play.startedAt,
      endedAt: play.endedAt,
      localDay: play.localDay,
      status: play.status,
    },
    station: play.station,
    recording: play.recording,
    work: play.work,
    detection: facts?.detection ?? null,
    shares: facts?.shares ?? [],
  }
}

/** @throws ConstraintViolation disputes_open_once where the play is in dispute already */
export async function insertDispute(
  trx: Transaction,
  dispute: { playId: PlayId; reason: string; evidence: Record<string, unknown>; openedBy: UserId },
): Promise<DisputeId> {
  const rows: { id: DisputeId }[] = await trx('disputes')
    .insert({
      play_id: dispute.playId,
      reason: dispute.reason,
      evidence: JSON.stringify(dispute.evidence),
      opened_by: dispute.openedBy,
    })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new dispute came back without an id')
  return row.id
}

export async function insertMessage(
  trx: Transaction,
  message: { disputeId: DisputeId; authorId: UserId; text: string },
): Promise<void> {
  await trx('dispute_messages').insert({
    dispute_id: message.disputeId,
    author_id: message.authorId,
    body: message.text,
  })
}

export async function recordDecision(
  trx: Transaction,
  decision: { disputeId: DisputeId; outcome: 'upheld' | 'dismissed'; reason: string; decidedBy: UserId },
): Promise<void> {
  await trx('disputes').where({ id: decision.disputeId }).update({
    status: decision.outcome,
    decided_by: decision.decidedBy,
    decided_at: trx.fn.now(),
    decision_reason: decision.reason,
  })
}

/** Where mail to the desk goes. */
export async function listClerkAddresses(connection: Connection): Promise<string[]> {
  const rows: { email: string }[] = await connection('users')
    .where({ role: 'clerk', status: 'active' })
    .orderBy('email')
    .select('email')
  return rows.map(({ email }) => email)
}
