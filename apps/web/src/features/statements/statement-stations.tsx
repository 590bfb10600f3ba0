import type { StatementView } from '@fieldfare/contracts'
import { Percent } from '../../components/figures.tsx'
import { ScrollRegion } from '../../components/scroll-region.tsx'
import { formatHours } from '../../lib/format.ts'
import { StatementMoney } from './statement-money.tsx'

/** What each station brought, with the coverage of its logs. */
export function StatementStations({ statement }: { statement: StatementView }) {
  const { currency, currencyDigits, stations } = statement
  return (
    <ScrollRegion label="Net amount by station">
      <table className="w-full text-[0.95rem] [&_td]:px-3 [&_td]:py-1.5 [&_th]:px-3 [&_th]:py-1.5">
        <caption className="sr-only">Net amount by station</caption>
        <thead>
          <tr className="border-b border-ink text-left">
            <th scope="col">Station</th>
            <th scope="col" className="text-right">
              Logs held
            </th>
            <th scope="col" className="text-right">
              Net amount
            </th>
          </tr>
        </thead>
        <tbody>
          {stations.map(({ station, netMinor, heldSeconds, expectedSeconds }) => (
            <tr key={station.id} className="border-b border-hairline">
              <th scope="row" className="text-left font-normal">
                {station.name} <span className="figures text-slate">{station.callName}</span>
              </th>
              <td className="text-right">
                {expectedSeconds > 0 && <Percent ratio={heldSeconds / expectedSeconds} />}
                <span className="block text-sm text-slate">
                  {formatHours(heldSeconds)} of {formatHours(expectedSeconds)}
                </span>
              </td>
              <td className="text-right">
                <StatementMoney amountMinor={netMinor} currency={currency} currencyDigits={currencyDigits} />
              </td>
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr className="ruled-total">
            <th scope="row" colSpan={2} className="text-left">
              Net amount
            </th>
            <td className="text-right">
              <StatementMoney
                amountMinor={statement.netMinor}
                currency={currency}
                currencyDigits={currencyDigits}
              />
            </td>
          </tr>
        </tfoot>
      </table>
    </ScrollRegion>
  )
}
