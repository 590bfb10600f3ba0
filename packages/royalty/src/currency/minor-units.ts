import { code as findCurrency } from 'currency-codes'
import { RoyaltyError } from '../royalty-error.ts'

/** Codes of the ISO 4217 list in which nobody can be paid: metals, units of account, test code, no currency. */
const NOT_PAYABLE: ReadonlySet<string> = new Set(
  'XAG XAU XBA XBB XBC XBD XDR XPD XPT XSU XTS XUA XXX'.split(' '),
)

/**
 * How many decimals the currency has, from ISO 4217 list one. `Intl` is not asked: it answers with the digits
 * customary for cash, which for some currencies (HUF, IDR and others) are fewer than the standard says.
 *
 * @throws RoyaltyError `unknown-currency` for a code that is not on the list, or that names no payable money.
 */
export function minorUnits(currency: string): number {
  const record = /^[A-Z]{3}$/.test(currency) ? findCurrency(currency) : undefined
  if (!record || NOT_PAYABLE.has(currency)) {
    throw new RoyaltyError('unknown-currency', `${currency} is not a currency anyone can be paid in.`)
  }
  return record.digits
}
