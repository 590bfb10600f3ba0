import type { MonthOverview } from '@fieldfare/contracts'
import { ChartFrame, type ChartColumn } from '../../components/chart-frame.tsx'
import { Count, Percent } from '../../components/figures.tsx'
import { SeriesChart } from '../../components/series-chart.tsx'
import { formatCount, formatHours, formatRatio } from '../../lib/format.ts'
import { identifiedShare } from './airtime.ts'

type StationRow = MonthOverview['stations'][number]

const nameColumn: ChartColumn<StationRow> = { header: 'Station', cell: ({ station }) => station.name }

const playColumns: readonly ChartColumn<StationRow>[] = [
  nameColumn,
  { header: 'Plays', align: 'end', cell: ({ plays }) => <Count value={plays} /> },
]

const shareColumns: readonly ChartColumn<StationRow>[] = [
  nameColumn,
  {
    header: 'Music',
    align: 'end',
    cell: ({ musicSeconds }) => <span className="figures">{formatHours(musicSeconds)}</span>,
  },
  {
    header: 'Identified',
    align: 'end',
    cell: (row) => {
      const share = identifiedShare(row)
      return share === null ? 'No music' : <Percent ratio={share} />
    },
  },
]

function playsTitle(stations: readonly StationRow[]): string {
  const total = stations.reduce((sum, { plays }) => sum + plays, 0)
  const [first] = [...stations].sort((one, other) => other.plays - one.plays)
  return first === undefined || total === 0
    ? 'No plays were found on any station'
    : `${first.station.name} has most plays: ${formatCount(first.plays)} of ${formatCount(total)}`
}

function shareTitle(stations: readonly StationRow[]): string {
  const shares = stations.map(identifiedShare).filter((share) => share !== null)
  if (shares.length === 0) return 'No music was heard on any station'
  const lowest = formatRatio(Math.min(...shares), 0)
  const highest = formatRatio(Math.max(...shares), 0)
  return lowest === highest
    ? `${lowest} of the music is identified`
    : `Between ${lowest} and ${highest} of the music is identified`
}

/** Plays and identified share, station beside station. */
export function StationCharts({ overview: { stations } }: { overview: MonthOverview }) {
  if (stations.length === 0) return null
  return (
    <div className="mt-8 grid gap-x-12 gap-y-8 lg:grid-cols-2">
      <ChartFrame
        title={playsTitle(stations)}
        rows={stations}
        rowId={({ station }) => station.id}
        columns={playColumns}
      >
        <SeriesChart
          kind="columns"
          rows={stations}
          category={({ station }) => station.callName}
          series={[{ label: 'Plays', value: ({ plays }) => plays }]}
          xLabel="Station"
          yLabel="Plays"
        />
      </ChartFrame>
      <ChartFrame
        title={shareTitle(stations)}
        rows={stations}
        rowId={({ station }) => station.id}
        columns={shareColumns}
      >
        <SeriesChart
          kind="columns"
          rows={stations}
          category={({ station }) => station.callName}
          series={[
            {
              label: 'Music identified (%)',
              value: (row) => Math.round((identifiedShare(row) ?? 0) * 1000) / 10,
            },
          ]}
          xLabel="Station"
          yLabel="Music identified (%)"
        />
      </ChartFrame>
    </div>
  )
}
