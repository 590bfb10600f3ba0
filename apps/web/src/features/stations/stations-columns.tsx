import type { MonthOverview, StationView } from '@fieldfare/contracts'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Count, Percent } from '../../components/figures.tsx'
import { Money } from '../../components/money.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatHours } from '../../lib/format.ts'
import { licenceOn, todayIn } from './licences.ts'

export type StationRow = {
  station: StationView
  figures: MonthOverview['stations'][number] | null
  month: string | null
}

const unknown = <span className="text-slate">None</span>

function LicenceNow({ station }: { station: StationView }) {
  const licence = licenceOn(station.licences, todayIn(station.timeZone))
  if (licence === null) return <StatusTag tone="warn">No licence today</StatusTag>
  return (
    <>
      <Money amountMinor={licence.monthlyFeeMinor} /> <span className="text-slate">a month</span>
    </>
  )
}

export const stationColumns: readonly DataColumn<StationRow>[] = [
  {
    id: 'name',
    header: 'Station',
    rowHeader: true,
    minWidth: '11rem',
    cell: ({ station }) => <TextLink to={`/stations/${station.id}`}>{station.name}</TextLink>,
  },
  {
    id: 'callName',
    header: 'Call name',
    cell: ({ station }) => <span className="figures">{station.callName}</span>,
  },
  { id: 'timeZone', header: 'Time zone', cell: ({ station }) => station.timeZone },
  { id: 'licence', header: 'Licence today', cell: ({ station }) => <LicenceNow station={station} /> },
]

export const stationColumnsWithMonth: readonly DataColumn<StationRow>[] = [
  ...stationColumns,
  {
    id: 'logs',
    header: 'Logs',
    align: 'end',
    cell: ({ station, figures, month }) =>
      figures === null ? (
        unknown
      ) : (
        <TextLink to={`/logs?stationId=${station.id}&month=${month ?? ''}`}>
          <Count value={figures.logs} />
        </TextLink>
      ),
  },
  {
    id: 'held',
    header: 'Held',
    align: 'end',
    cell: ({ figures }) =>
      figures === null ? unknown : <span className="figures">{formatHours(figures.heldSeconds)}</span>,
  },
  {
    id: 'plays',
    header: 'Plays',
    align: 'end',
    cell: ({ station, figures, month }) =>
      figures === null ? (
        unknown
      ) : (
        <TextLink to={`/plays?stationId=${station.id}&month=${month ?? ''}`}>
          <Count value={figures.plays} />
        </TextLink>
      ),
  },
  {
    id: 'identified',
    header: 'Music identified',
    align: 'end',
    cell: ({ figures }) =>
      figures === null || figures.musicSeconds === 0 ? (
        <span className="text-slate">No music</span>
      ) : (
        <Percent ratio={figures.identifiedSeconds / figures.musicSeconds} />
      ),
  },
]
