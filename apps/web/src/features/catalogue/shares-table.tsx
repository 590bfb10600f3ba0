import type { ShareSet } from '@fieldfare/contracts'
import { Percent } from '../../components/figures.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { ScrollRegion } from '../../components/scroll-region.tsx'
import { formatDay } from '../../lib/format-time.ts'

/** Shares with the days they are valid on, closed by what is claimed today. */
export function SharesTable({ shares, caption }: { shares: ShareSet; caption: string }) {
  return (
    <ScrollRegion label={caption}>
      <table className="w-full text-[0.95rem]">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-b border-ink">
            <th scope="col" className="px-3 py-1.5 text-left">
              Party
            </th>
            <th scope="col" className="px-3 py-1.5 text-left">
              Valid from
            </th>
            <th scope="col" className="px-3 py-1.5 text-left">
              Last day
            </th>
            <th scope="col" className="px-3 py-1.5 text-right">
              Share
            </th>
          </tr>
        </thead>
        <tbody>
          {shares.items.map((share) => (
            <tr key={share.id} className="border-b border-hairline">
              <th scope="row" className="px-3 py-2 text-left font-normal">
                <TextLink to={`/parties/${share.party.id}`}>{share.party.name}</TextLink>
              </th>
              <td className="px-3 py-2 whitespace-nowrap">{formatDay(share.validFrom)}</td>
              <td className="px-3 py-2 whitespace-nowrap">
                {share.validTo === null ? 'Open-ended' : formatDay(share.validTo)}
              </td>
              <td className="px-3 py-2 text-right">
                <Percent ppm={share.sharePpm} decimals={4} />
              </td>
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr className="ruled-total">
            <th scope="row" colSpan={3} className="px-3 py-2 text-left">
              Claimed today
            </th>
            <td className="px-3 py-2 text-right">
              <Percent ppm={shares.totalTodayPpm} decimals={4} />
            </td>
          </tr>
        </tfoot>
      </table>
    </ScrollRegion>
  )
}
