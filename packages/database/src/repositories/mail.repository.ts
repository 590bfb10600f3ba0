import type { Instant, MailMessageId } from '@fieldfare/contracts'
import type { Connection, Database, Transaction } from '../connection.ts'
import { enqueueJob } from '../jobs/job.repository.ts'
import { fetchPage, type PageRequest, type PageResult } from '../paging.ts'

export type MailMessage = {
  id: MailMessageId
  to: string
  subject: string
  text: string
  createdAt: Instant
  sentAt: Instant | null
}

const columns = {
  id: 'id',
  to: 'recipient',
  subject: 'subject',
  text: 'body',
  createdAt: 'created_at',
  sentAt: 'sent_at',
}

/** Writes a mail and asks for it to be sent, both in the caller's transaction. */
export async function sendMail(
  trx: Transaction,
  mail: { to: string; subject: string; text: string },
): Promise<MailMessageId> {
  const rows: { id: MailMessageId }[] = await trx('mail_messages')
    .insert({ recipient: mail.to, subject: mail.subject, body: mail.text })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new mail came back without an id')
  await enqueueJob(trx, {
    kind: 'send-mail',
    payload: { mailMessageId: row.id },
    dedupeKey: `send-mail-${row.id}`,
  })
  return row.id
}

export async function findMail(connection: Connection, id: MailMessageId): Promise<MailMessage | null> {
  const row: MailMessage | undefined = await connection('mail_messages').where({ id }).first(columns)
  return row ?? null
}

/**
 * Notes that a mail has left. Unless it is to be read in the local inbox, its text goes: it may hold a link that
 * opens an account.
 */
export async function markMailSent(
  connection: Connection,
  id: MailMessageId,
  { keepText }: { keepText: boolean },
): Promise<void> {
  await connection('mail_messages')
    .where({ id })
    .whereNull('sent_at')
    .update({ sent_at: connection.fn.now(), ...(keepText ? {} : { body: '' }) })
}

export async function listMail(database: Database, page: PageRequest): Promise<PageResult<MailMessage>> {
  const query = database('mail_messages')
    .select<MailMessage[]>(columns)
    .orderBy([
      { column: 'created_at', order: 'desc' },
      { column: 'id', order: 'desc' },
    ])
  return fetchPage<MailMessage>(database, query, page)
}
