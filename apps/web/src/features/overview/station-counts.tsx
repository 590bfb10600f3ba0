import type { MonthOverview } from '@fieldfare/contracts'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Count, Percent } from '../../components/figures.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatHours } from '../../lib/format.ts'
import { useMemo } from 'react'
import { identifiedShare } from './airtime.ts'

type StationRow = MonthOverview['stations'][number] & { month: string }

function hours(seconds: number) {
  return <span className="figures">{formatHours(seconds)}</span>
}

const columns: readonly DataColumn<StationRow>[] = [
  {
    id: 'station',
    header: 'Station',
    rowHeader: true,
    minWidth: '11rem',
    cell: ({ station, month }) => (
      <TextLink to={`/stations/${station.id}?month=${month}`}>{station.name}</TextLink>
    ),
  },
  {
    id: 'callName',
    header: 'Call name',
    hiddenAtFirst: true,
    cell: ({ station }) => <span className="figures">{station.callName}</span>,
  },
  {
    id: 'plays',
    header: 'Plays',
    align: 'end',
    cell: ({ station, month, plays }) => (
      <TextLink to={`/plays?stationId=${station.id}&month=${month}`}>
        <Count value={plays} />
      </TextLink>
    ),
  },
  { id: 'held', header: 'Held', align: 'end', cell: (row) => hours(row.heldSeconds) },
  {
    id: 'heldShare',
    header: 'Of expected',
    align: 'end',
    cell: (row) =>
      row.expectedSeconds === 0 ? (
        <span className="text-slate">None expected</span>
      ) : (
        <Percent ratio={row.heldSeconds / row.expectedSeconds} />
      ),
  },
  { id: 'music', header: 'Music', align: 'end', cell: (row) => hours(row.musicSeconds) },
  {
    id: 'identified',
    header: 'Identified',
    align: 'end',
    cell: (row) => {
      const share = identifiedShare(row)
      return share === null ? <span className="text-slate">No music</span> : <Percent ratio={share} />
    },
  },
  {
    id: 'waiting',
    header: 'To review',
    align: 'end',
    cell: ({ station, month, waitingForReview }) =>
      waitingForReview === 0 ? (
        <Count value={0} />
      ) : (
        <TextLink to={`/detections?stationId=${station.id}&month=${month}&state=waiting`}>
          <Count value={waitingForReview} />
        </TextLink>
      ),
  },
  {
    id: 'logs',
    header: 'Logs',
    align: 'end',
    cell: ({ station, month, logs }) => (
      <TextLink to={`/logs?stationId=${station.id}&month=${month}`}>
        <Count value={logs} />
      </TextLink>
    ),
  },
]

/** How much of each station is held, and how many plays were found in it. */
export function StationCounts({ overview }: { overview: MonthOverview }) {
  const { stations, month } = overview
  const query = useMemo(
    () => ({
      data: { items: stations.map((row): StationRow => ({ ...row, month })) },
      error: null,
      isFetching: false,
      refetch: () => undefined,
    }),
    [stations, month],
  )
  return (
    <DataTable
      name="month-stations"
      caption="Plays and airtime by station"
      captionHidden
      noun="stations"
      columns={columns}
      query={query}
      rowId={(row) => row.station.id}
      empty={
        <EmptyState title="No stations yet" action={<LinkButton to="/stations">See the stations</LinkButton>}>
          An administrator adds stations and their licences.
        </EmptyState>
      }
    />
  )
}
