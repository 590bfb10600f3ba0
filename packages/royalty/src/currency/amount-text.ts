import { RoyaltyError } from '../royalty-error.ts'
import { minorUnits } from './minor-units.ts'

const MINUS = '\u2212'

/** The figures of an amount: grouped by thousands, a decimal point, U+2212 before a negative amount, no currency. */
export function formatAmount(amountMinor: bigint, currency: string): string {
  const decimals = minorUnits(currency)
  const negative = amountMinor < 0n
  const digits = (negative ? -amountMinor : amountMinor).toString().padStart(decimals + 1, '0')
  const whole = digits.slice(0, digits.length - decimals).replace(/\B(?=(\d{3})+$)/g, ',')
  const fraction = decimals > 0 ? `.${digits.slice(-decimals)}` : ''
  return `${negative ? MINUS : ''}${whole}${fraction}`
}

/** As {@link formatAmount} but plain: no grouping and an ASCII hyphen, for files that programs read. */
export function formatPlainAmount(amountMinor: bigint, currency: string): string {
  return formatAmount(amountMinor, currency).replaceAll(',', '').replace(MINUS, '-')
}

/** The amount after its currency code, separated by a space that does not break: `EUR 1,234.56`. */
export function formatMoney(amountMinor: bigint, currency: string): string {
  return `${currency}\u00a0${formatAmount(amountMinor, currency)}`
}

/**
 * Reads what {@link formatAmount} and {@link formatPlainAmount} write, and what people type: the comma groups
 * thousands, the point comes before the decimals, fewer decimals than the currency has are filled with zeros.
 *
 * @throws RoyaltyError `unreadable-amount` for anything else, in particular for more decimals than the currency has.
 */
export function parseAmount(text: string, currency: string): bigint {
  const decimals = minorUnits(currency)
  const match = /^([-\u2212]?)(\d+|\d{1,3}(?:,\d{3})+)(?:\.(\d+))?$/.exec(text.trim())
  const fraction = match?.[3] ?? ''
  if (!match || fraction.length > decimals) {
    const form = decimals === 0 ? 'no decimals' : `at most ${decimals} decimals after a point`
    throw new RoyaltyError('unreadable-amount', `Write an amount in ${currency} as figures with ${form}.`)
  }
  const digits = `${(match[2] ?? '').replaceAll(',', '')}${fraction.padEnd(decimals, '0')}`
  return match[1] ? -BigInt(digits) : BigInt(digits)
}
