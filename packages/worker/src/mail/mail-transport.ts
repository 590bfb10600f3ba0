import type { MailConfiguration } from '@fieldfare/database'
import { createTransport } from 'nodemailer'

export type OutgoingMail = { to: string; subject: string; text: string; messageId: string }

export type MailTransport = { send: (mail: OutgoingMail) => Promise<void>; close: () => void }

/**
 * Mail through an SMTP server, or, for the local inbox, composed and checked as if it would leave and then only kept:
 * its row is what administrators read in the product.
 */
export function createMailTransport(configuration: MailConfiguration): MailTransport {
  const transport =
    configuration.kind === 'smtp'
      ? createTransport(configuration.url)
      : createTransport({ streamTransport: true, buffer: true, newline: 'unix' })
  return {
    async send({ messageId, ...mail }) {
      await transport.sendMail({ ...mail, from: configuration.from, messageId: `<${messageId}@fieldfare>` })
    },
    close: () => transport.close(),
  }
}
