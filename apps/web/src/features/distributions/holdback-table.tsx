import { rightLabels, type DistributionView } from '@fieldfare/contracts'
import { Money } from '../../components/money.tsx'
import { EmptyState } from '../../components/states.tsx'
import { ScrollRegion } from '../../components/scroll-region.tsx'
import { sumMinor } from './station-sums.ts'

/** What is kept back, from whom and why. */
export function HoldbackTable({ view: { holdbacks } }: { view: DistributionView }) {
  if (holdbacks.length === 0) {
    return <EmptyState title="Nothing is held back">Every pool went to payees to the last unit.</EmptyState>
  }
  return (
    <ScrollRegion label="Money held back">
      <table className="w-full text-[0.95rem] [&_td]:px-3 [&_td]:py-1.5 [&_th]:px-3 [&_th]:py-1.5">
        <caption className="sr-only">Money held back</caption>
        <thead>
          <tr className="border-b border-ink text-left">
            <th scope="col">What</th>
            <th scope="col">Station</th>
            <th scope="col">Right</th>
            <th scope="col">Why</th>
            <th scope="col" className="text-right">
              Amount
            </th>
          </tr>
        </thead>
        <tbody>
          {holdbacks.map((holdback, index) => (
            // Holdbacks have no identity of their own and never change within a run.
            <tr key={index} className="border-b border-hairline align-top">
              <th scope="row" className="min-w-40 text-left font-normal">
                {holdback.subject}
              </th>
              <td>{holdback.station.name}</td>
              <td>{rightLabels[holdback.right]}</td>
              <td className="min-w-52">{holdback.reason}</td>
              <td className="text-right">
                <Money amountMinor={holdback.amountMinor} />
              </td>
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr className="ruled-total">
            <th scope="row" colSpan={4} className="text-left">
              Held back
            </th>
            <td className="text-right">
              <Money amountMinor={sumMinor(holdbacks.map(({ amountMinor }) => amountMinor))} />
            </td>
          </tr>
        </tfoot>
      </table>
    </ScrollRegion>
  )
}
