import { type HoldbackReason } from './distribution.ts'

const EXPLANATIONS = {
  'no-plays': 'The station paid for the month, but no play was counted on it.',
  'no-work': 'The work behind this recording is not known yet.',
  'no-shares': 'Nobody has registered a share yet.',
  'no-valid-share': 'Shares are registered, but none was valid on the day of the play.',
  'shares-incomplete': 'The registered shares come to less than 100 %; this is the part nobody has claimed.',
  'shares-over-claimed':
    'The registered shares come to more than 100 %; the parties have to settle them first.',
} as const satisfies Record<HoldbackReason, string>

/** The reason for a holdback as a payee reads it. */
export function explainHoldback(reason: HoldbackReason): string {
  return EXPLANATIONS[reason]
}
