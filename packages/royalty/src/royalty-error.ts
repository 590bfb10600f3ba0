/** What can stop a calculation; each has one meaning that a caller may act on. */
export type RoyaltyErrorCode =
  | 'unknown-currency'
  | 'unreadable-amount'
  | 'nothing-to-divide-by'
  | 'invalid-weight'
  | 'invalid-input'
  | 'unknown-payee'
  | 'not-closed'

/** A calculation that must not go on. Nothing is ever rounded, dropped or guessed instead of throwing this. */
export class RoyaltyError extends Error {
  readonly code: RoyaltyErrorCode

  constructor(code: RoyaltyErrorCode, message: string) {
    super(message)
    this.name = 'RoyaltyError'
    this.code = code
  }
}

/** Stops the calculation on input that breaks one of its stated conditions. */
export function requireInput(condition: boolean, message: string): asserts condition {
  if (!condition) throw new RoyaltyError('invalid-input', message)
}
