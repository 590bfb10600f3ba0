import { findMail, markMailSent } from '@fieldfare/database'
import type { JobHandler } from './job-context.ts'

/** Sends one mail. Mail servers drop a second copy by its message id, should the job run twice. */
export const sendMailJob: JobHandler<'send-mail'> = {
  async run({ configuration, database, mail, finish }, { mailMessageId }) {
    const message = await findMail(database, mailMessageId)
    if (message !== null && message.sentAt === null) {
      await mail.send({
        to: message.to,
        subject: message.subject,
        text: message.text,
        messageId: message.id,
      })
    }
    const keepText = configuration.mail.kind === 'inbox'
    await finish((trx) => markMailSent(trx, mailMessageId, { keepText }))
  },
}
