import { rightLabels, type StatementView } from '@fieldfare/contracts'
import type { ReactNode } from 'react'
import { Percent } from '../../components/figures.tsx'
import { StatementMoney } from './statement-money.tsx'

/** The account of a statement: gross, every deduction by name, net; and the net again by right. */
export function StatementAccount({ statement }: { statement: StatementView }) {
  const { currency, currencyDigits } = statement
  const money = (amountMinor: string | bigint) => (
    <StatementMoney amountMinor={amountMinor} currency={currency} currencyDigits={currencyDigits} />
  )
  return (
    <div className="grid gap-8 lg:grid-cols-2">
      <Account caption="Gross, deductions and net">
        <Row name="Gross amount attributed" amount={money(statement.grossMinor)} />
        {statement.deductions.map((deduction) => (
          <Row
            key={deduction.code}
            name={
              <>
                {deduction.label}{' '}
                <span className="text-slate">
                  (<Percent ppm={deduction.ratePpm} decimals={4} />)
                </span>
              </>
            }
            amount={money(-BigInt(deduction.amountMinor))}
          />
        ))}
        <Row name="Net amount" amount={money(statement.netMinor)} isTotal />
      </Account>
      <Account caption="The net amount by right">
        {statement.rights.map(({ right, netMinor }) => (
          <Row key={right} name={rightLabels[right]} amount={money(netMinor)} />
        ))}
        <Row name="Net amount" amount={money(statement.netMinor)} isTotal />
      </Account>
    </div>
  )
}

function Account({ caption, children }: { caption: string; children: ReactNode }) {
  return (
    <table className="w-full self-start">
      <caption className="border-b border-ink pb-1 text-left font-serif text-lg">{caption}</caption>
      <tbody>{children}</tbody>
    </table>
  )
}

function Row({ name, amount, isTotal = false }: { name: ReactNode; amount: ReactNode; isTotal?: boolean }) {
  return (
    <tr className={isTotal ? 'ruled-total' : 'border-b border-hairline'}>
      <th scope="row" className={isTotal ? 'py-2 text-left' : 'py-2 text-left font-normal'}>
        {name}
      </th>
      <td className="py-2 text-right">{amount}</td>
    </tr>
  )
}
