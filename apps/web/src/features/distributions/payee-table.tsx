import type { DistributionView } from '@fieldfare/contracts'
import { Money } from '../../components/money.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { ScrollRegion } from '../../components/scroll-region.tsx'
import { sumMinor } from './station-sums.ts'

/** What each party is due, with the way to its statement. */
export function PayeeTable({ view: { payeeTotals } }: { view: DistributionView }) {
  if (payeeTotals.length === 0) {
    return (
      <EmptyState title="Nobody is due anything">
        No counted play of this month has a share that is valid on its day. What was earned is held back.
      </EmptyState>
    )
  }
  return (
    <ScrollRegion label="Payees of the month">
      <table className="w-full text-[0.95rem] [&_td]:px-3 [&_td]:py-1.5 [&_th]:px-3 [&_th]:py-1.5">
        <caption className="sr-only">Payees of the month</caption>
        <thead>
          <tr className="border-b border-ink text-left">
            <th scope="col">Party</th>
            <th scope="col">Statement</th>
            <th scope="col" className="text-right">
              Amount
            </th>
          </tr>
        </thead>
        <tbody>
          {payeeTotals.map(({ party, amountMinor, statementId }) => (
            <tr key={party.id} className="border-b border-hairline">
              <th scope="row" className="text-left font-normal">
                <TextLink to={`/parties/${party.id}`}>{party.name}</TextLink>
              </th>
              <td>
                {statementId === null ? (
                  <span className="text-slate">Not made yet</span>
                ) : (
                  <TextLink to={`/statements/${statementId}`} aria-label={`Statement of ${party.name}`}>
                    Open
                  </TextLink>
                )}
              </td>
              <td className="text-right">
                <Money amountMinor={amountMinor} signed />
              </td>
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr className="ruled-total">
            <th scope="row" colSpan={2} className="text-left">
              All payees
            </th>
            <td className="text-right">
              <Money amountMinor={sumMinor(payeeTotals.map(({ amountMinor }) => amountMinor))} />
            </td>
          </tr>
        </tfoot>
      </table>
    </ScrollRegion>
  )
}
