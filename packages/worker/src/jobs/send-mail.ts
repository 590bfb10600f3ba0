import { findMail, markMailSent } from '@fieldfare/database'
import type { JobHandler } from './job-context.ts'

const HOUR_MS = 3_600_000

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
  // Mail servers are away for minutes or hours, and nobody sends an invitation or a notice a second time: the pauses
  // double from five seconds to an hour, half a day in all.
  retries: { attempts: 21, pauseMs: (attempts) => Math.min(HOUR_MS, 5000 * 2 ** (attempts - 1)) },
}
