import { moneyParts } from '../lib/format-money.ts'
import { useSociety } from '../lib/society.tsx'
import { classNames } from '../lib/class-names.ts'

export type MoneyProps = {
  amountMinor: string | bigint
  /** Default: the society's currency. */
  currency?: string
  currencyDigits?: number
  /** Colours a negative amount; the minus sign says it too. */
  signed?: boolean
}

/** An amount in tabular figures with its currency, minus as U+2212. */
export function Money({ amountMinor, currency, currencyDigits, signed = false }: MoneyProps) {
  const society = useSociety()
  const code = currency ?? society?.currency ?? 'XXX'
  const { sign, symbol, figures } = moneyParts(
    amountMinor,
    code,
    currencyDigits ?? society?.currencyDigits ?? 2,
  )
  return (
    <span className={classNames('figures', signed && sign !== '' && 'text-bad')}>
      {sign}
      <span className="text-slate">{symbol}</span>
      {'\u202f'}
      {figures}
    </span>
  )
}
