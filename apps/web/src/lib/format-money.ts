const MINUS = '\u2212'
const NARROW_SPACE = '\u202f'

function currencySymbol(currency: string): string {
  const parts = new Intl.NumberFormat('en', {
    style: 'currency',
    currency,
    currencyDisplay: 'narrowSymbol',
  }).formatToParts(0)
  return parts.find((part) => part.type === 'currency')?.value ?? currency
}

export type MoneyText = { sign: string; symbol: string; figures: string }

/** Minor units as figures people read, by text alone so that no digit is lost: 1234567 becomes 12,345.67. */
export function formatMinor(amountMinor: string | bigint, digits: number): { sign: string; figures: string } {
  const amount = BigInt(amountMinor)
  const text = (amount < 0n ? -amount : amount).toString().padStart(digits + 1, '0')
  const whole = text.slice(0, text.length - digits).replace(/\B(?=(\d{3})+$)/g, ',')
  const part = digits === 0 ? '' : `.${text.slice(text.length - digits)}`
  return { sign: amount < 0n ? MINUS : '', figures: `${whole}${part}` }
}

export function moneyParts(amountMinor: string | bigint, currency: string, digits: number): MoneyText {
  return { ...formatMinor(amountMinor, digits), symbol: currencySymbol(currency) }
}

/** One line of text: −€ 1,234.56. The symbol keeps a narrow space from the figures. */
export function formatMoney(amountMinor: string | bigint, currency: string, digits: number): string {
  const { sign, symbol, figures } = moneyParts(amountMinor, currency, digits)
  return `${sign}${symbol}${NARROW_SPACE}${figures}`
}

/** Commas stand between groups of three figures only: 1200,50 is not 120,050. */
const AMOUNT = /^(-?)(\d{1,15}|\d{1,3}(?:,\d{3}){1,4})(?:\.(\d+))?$/

/** What a person typed (1,234.56 or 1234.5) as minor units; null where it is not an amount. */
export function parseMoney(text: string, digits: number): string | null {
  const compact = text.replace(/[\s\u202f\u00a0]/g, '').replace(MINUS, '-')
  const match = AMOUNT.exec(compact)
  if (match === null) return null
  const [, sign = '', whole = '', part = ''] = match
  if (part.length > digits) return null
  return BigInt(`${sign}${whole.replaceAll(',', '')}${part.padEnd(digits, '0')}`).toString()
}
