import { rightLabels, type StatementView } from '@fieldfare/contracts'
import { StatementMoney } from './statement-money.tsx'

/** Holdbacks that concern the payee, with the reason. */
export function StatementHoldbacks({ statement }: { statement: StatementView }) {
  const { holdbacks, currency, currencyDigits } = statement
  if (holdbacks.length === 0) {
    return <p className="text-slate">Nothing is held back that concerns this payee.</p>
  }
  return (
    <ul className="divide-y divide-hairline border-b border-hairline">
      {holdbacks.map((holdback, index) => (
        // Holdbacks have no identity of their own and never change within a statement.
        <li key={index} className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1 py-2">
          <span className="min-w-0">
            {holdback.subject}
            <span className="block text-sm text-slate">
              {holdback.station.name}, {rightLabels[holdback.right]}: {holdback.reason}
            </span>
          </span>
          <StatementMoney
            amountMinor={holdback.amountMinor}
            currency={currency}
            currencyDigits={currencyDigits}
          />
        </li>
      ))}
    </ul>
  )
}
