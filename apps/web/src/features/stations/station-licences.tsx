import type { LicenceView, StationView } from '@fieldfare/contracts'
import { Plus } from 'lucide-react'
import { LinkButton } from '../../components/button.tsx'
import { Percent } from '../../components/figures.tsx'
import { Money } from '../../components/money.tsx'
import { Section } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatDay } from '../../lib/format-time.ts'
import { licenceOn, todayIn } from './licences.ts'

/** What the station pays, period by period. */
export function StationLicences({ station }: { station: StationView }) {
  const add = station.canEdit && (
    <LinkButton to={`/stations/${station.id}/licences/new`} icon={Plus}>
      Add a licence
    </LinkButton>
  )
  return (
    <Section title="Licences" actions={station.licences.length > 0 && add}>
      {station.licences.length === 0 ? (
        <EmptyState title="No licence yet" action={add}>
          Without a licence a month of this station earns nothing to divide.
          {!station.canEdit && ' An administrator adds licences.'}
        </EmptyState>
      ) : (
        <LicenceTable station={station} />
      )}
    </Section>
  )
}

function LicenceTable({ station }: { station: StationView }) {
  const now = licenceOn(station.licences, todayIn(station.timeZone))
  return (
    <div className="overflow-x-auto border-y border-ink">
      <table aria-label={`Licences of ${station.name}`} className="w-full text-[0.95rem]">
        <thead>
          <tr className="bg-band text-left">
            <th scope="col" className="px-3 py-1.5">
              Valid
            </th>
            <th scope="col" className="px-3 py-1.5 text-right">
              Fee a month
            </th>
            <th scope="col" className="px-3 py-1.5 text-right">
              To works
            </th>
            <th scope="col" className="px-3 py-1.5 text-right">
              To recordings
            </th>
          </tr>
        </thead>
        <tbody>
          {station.licences.map((licence) => (
            <LicenceRow
              key={licence.id}
              licence={licence}
              isNow={licence.id === now?.id}
              {...(station.canEdit ? { editAddress: `/stations/${station.id}/licences/${licence.id}` } : {})}
            />
          ))}
        </tbody>
      </table>
    </div>
  )
}

function LicenceRow({
  licence,
  isNow,
  editAddress,
}: {
  licence: LicenceView
  isNow: boolean
  editAddress?: string
}) {
  const { validFrom, validTo, monthlyFeeMinor, worksPartPpm } = licence
  const period = `${formatDay(validFrom)} ${validTo === null ? 'onwards' : `to ${formatDay(validTo)}`}`
  return (
    <tr>
      <th scope="row" className="border-t border-hairline px-3 py-2 text-left font-normal">
        <span className="flex flex-wrap gap-x-4">
          {editAddress === undefined ? period : <TextLink to={editAddress}>{period}</TextLink>}
          {isNow && <StatusTag tone="good">In force today</StatusTag>}
        </span>
      </th>
      <td className="border-t border-hairline px-3 py-2 text-right">
        <Money amountMinor={monthlyFeeMinor} />
      </td>
      <td className="border-t border-hairline px-3 py-2 text-right">
        <Percent ppm={worksPartPpm} decimals={4} />
      </td>
      <td className="border-t border-hairline px-3 py-2 text-right">
        <Percent ppm={1_000_000 - worksPartPpm} decimals={4} />
      </td>
    </tr>
  )
}
