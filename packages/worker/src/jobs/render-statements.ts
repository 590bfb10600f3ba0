import { monthSchema, type StatementId } from '@fieldfare/contracts'
import {
  inTransaction,
  listPublishersToTell,
  listStatementsToRender,
  lockDistributionRun,
  markDistributionIssued,
  readSociety,
  readStatementContents,
  saveStatementFile,
  sendMail,
  type DistributionRun,
  type StatementToRender,
  type Transaction,
} from '@fieldfare/database'
import { createHash } from 'node:crypto'
import { Readable } from 'node:stream'
import { describeStatementDocument } from '../statements/describe-statement.ts'
import { renderStatementCsv } from '../statements/render-statement-csv.ts'
import { renderStatementPdf } from '../statements/render-statement-pdf.ts'
import { JobRefused, type JobContext, type JobHandler } from './job-context.ts'

async function storeFile(
  { storage, database }: JobContext,
  statementId: StatementId,
  kind: 'pdf' | 'csv',
  contents: Buffer,
): Promise<void> {
  const storageKey = `statements/${statementId}.${kind}`
  await storage.put(storageKey, { stream: Readable.from([contents]) })
  const sha256 = createHash('sha256').update(contents).digest()
  await inTransaction(database, (trx) =>
    saveStatementFile(trx, { statementId, kind, storageKey, sizeBytes: contents.length, sha256 }),
  )
}

async function renderStatement(
  context: JobContext,
  run: DistributionRun,
  statement: StatementToRender,
): Promise<void> {
  const { database, configuration } = context
  const document = describeStatementDocument({
    run,
    statement,
    contents: await readStatementContents(database, statement.id),
    society: await readSociety(database),
    publicUrl: configuration.publicUrl,
  })
  await storeFile(context, statement.id, 'pdf', await renderStatementPdf(document))
  await storeFile(context, statement.id, 'csv', Buffer.from(renderStatementCsv(document), 'utf8'))
}

async function tellPublishers(trx: Transaction, context: JobContext, run: DistributionRun): Promise<void> {
  const month = run.month.slice(0, 7)
  for (const publisher of await listPublishersToTell(trx, run.id)) {
    await sendMail(trx, {
      to: publisher.email,
      subject: `Statement ${publisher.number} for ${publisher.partyName}`,
      text: [
        `Dear ${publisher.name},`,
        `the statement of ${month} for ${publisher.partyName} has been issued. You find it, with every play behind it, at`,
        `${context.configuration.publicUrl}/statements`,
        'You can question any line of it there.',
      ].join('\n\n'),
    })
  }
}

/** Makes the files of a month's statements, then issues the month and tells the publishers. */
export const renderStatementsJob: JobHandler<'render-statements'> = {
  async run(context, { distributionId }) {
    const { database, tell, finish, signal } = context
    const run = await inTransaction(database, (trx) => lockDistributionRun(trx, distributionId))
    if (run === null) throw new JobRefused('The distribution is not known.')
    const month = monthSchema.parse(run.month.slice(0, 7))
    if (run.status === 'issuing') {
      const statements = await listStatementsToRender(database, run.id)
      for (const [done, statement] of statements.entries()) {
        signal.throwIfAborted()
        const progress = { kind: 'distribution-progress', month, done, total: statements.length } as const
        await tell({ ...progress, status: 'issuing' })
        await renderStatement(context, run, statement)
      }
    }
    await finish(async (trx) => {
      const locked = await lockDistributionRun(trx, distributionId)
      if (locked?.status !== 'issuing') return
      await markDistributionIssued(trx, locked)
      await tellPublishers(trx, context, locked)
    })
    await tell({ kind: 'distribution-progress', month, status: 'issued', done: 1, total: 1 })
  },
}
