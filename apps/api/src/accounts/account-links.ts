import type { UserId } from '@fieldfare/contracts'
import { replaceAccountToken, sendMail, type Transaction } from '@fieldfare/database'
import { createOpaqueToken } from '../http/session-tokens.ts'

const HOUR_MS = 3_600_000
const INVITATION_MS = 7 * 24 * HOUR_MS
const RESET_MS = HOUR_MS

export type LinkRecipient = { userId: UserId; email: string; name: string }
export type LinkSetting = { publicUrl: string; societyName: string; now: Date }

/** Behind the number sign, so that the token reaches neither a server's log nor another site's. */
function linkTo(setting: LinkSetting, path: string, token: string): string {
  return `${setting.publicUrl}${path}#token=${token}`
}

/** Sends an invitation and makes it the only one that works for this person. */
export async function sendInvitation(
  trx: Transaction,
  recipient: LinkRecipient,
  setting: LinkSetting,
): Promise<void> {
  const { token, tokenHash } = createOpaqueToken()
  await replaceAccountToken(trx, {
    userId: recipient.userId,
    kind: 'invitation',
    tokenHash,
    expiresAt: new Date(setting.now.getTime() + INVITATION_MS),
  })
  await sendMail(trx, {
    to: recipient.email,
    subject: `${setting.societyName}: your invitation to Fieldfare`,
    text: [
      `Dear ${recipient.name},`,
      `${setting.societyName} invites you to Fieldfare, its distribution desk. Choose a password to begin:`,
      linkTo(setting, '/invitation', token),
      'The link works once and for seven days. If you do not know what this is about, you can ignore it.',
    ].join('\n\n'),
  })
}

/** Sends a link to set a new password and makes it the only one that works for this person. */
export async function sendPasswordReset(
  trx: Transaction,
  recipient: LinkRecipient,
  setting: LinkSetting,
): Promise<void> {
  const { token, tokenHash } = createOpaqueToken()
  await replaceAccountToken(trx, {
    userId: recipient.userId,
    kind: 'password-reset',
    tokenHash,
    expiresAt: new Date(setting.now.getTime() + RESET_MS),
  })
  await sendMail(trx, {
    to: recipient.email,
    subject: `${setting.societyName}: set a new password`,
    text: [
      `Dear ${recipient.name},`,
      'Somebody, probably you, asked to set a new password for Fieldfare:',
      linkTo(setting, '/password-reset', token),
      'The link works once and for one hour. If it was not you, ignore this mail; your password stays as it is.',
    ].join('\n\n'),
  })
}
