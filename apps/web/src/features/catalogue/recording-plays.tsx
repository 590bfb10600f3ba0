import type { EndpointOutput, getRecordingPlays } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { ChartFrame, type ChartColumn } from '../../components/chart-frame.tsx'
import { Count } from '../../components/figures.tsx'
import { Section } from '../../components/page-header.tsx'
import { SeriesChart } from '../../components/series-chart.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { formatHours } from '../../lib/format.ts'
import { formatMonth } from '../../lib/format-time.ts'
import { recordingPlaysQuery } from './catalogue-queries.ts'

type PlayCounts = EndpointOutput<typeof getRecordingPlays>
type StationCount = PlayCounts['stations'][number]
type MonthCount = PlayCounts['months'][number]

const stationColumns: readonly ChartColumn<StationCount>[] = [
  { header: 'Station', cell: ({ station }) => `${station.callName}, ${station.name}` },
  { header: 'Plays', align: 'end', cell: ({ plays }) => <Count value={plays} /> },
  {
    header: 'Airtime',
    align: 'end',
    cell: ({ seconds }) => <span className="figures">{formatHours(seconds)}</span>,
  },
]

const monthColumns: readonly ChartColumn<MonthCount>[] = [
  { header: 'Month', cell: ({ month }) => formatMonth(month) },
  { header: 'Plays', align: 'end', cell: ({ plays }) => <Count value={plays} /> },
  {
    header: 'Airtime',
    align: 'end',
    cell: ({ seconds }) => <span className="figures">{formatHours(seconds)}</span>,
  },
]

/** Where and when the recording was heard. */
export function RecordingPlays({ recordingId }: { recordingId: string }) {
  const counts = useQuery(recordingPlaysQuery(recordingId))
  return (
    <Section title="Where and when it was played" lead="Counted plays only; removed ones are left out.">
      <QueryState query={counts} loading="Counting the plays">
        {({ stations, months }) =>
          stations.length === 0 ? (
            <EmptyState title="Not played yet">
              Plays appear once station logs that hold this recording are analysed.
            </EmptyState>
          ) : (
            <div className="grid gap-8 lg:grid-cols-2">
              <StationChart rows={stations} />
              <MonthChart rows={months} />
            </div>
          )
        }
      </QueryState>
    </Section>
  )
}

function StationChart({ rows }: { rows: readonly StationCount[] }) {
  const most = rows.reduce<StationCount | null>(
    (best, row) => (best === null || row.plays > best.plays ? row : best),
    null,
  )
  return (
    <ChartFrame
      title={most === null ? 'Plays by station' : `Most often on ${most.station.name}`}
      lead="Plays by station"
      rows={rows}
      rowId={({ station }) => station.id}
      columns={stationColumns}
    >
      <SeriesChart
        kind="columns"
        rows={rows}
        category={({ station }) => station.callName}
        series={[{ label: 'Plays', value: ({ plays }) => plays }]}
        xLabel="Station"
        yLabel="Plays"
        height={240}
      />
    </ChartFrame>
  )
}

function MonthChart({ rows }: { rows: readonly MonthCount[] }) {
  return (
    <ChartFrame
      title="Plays by month"
      lead="All stations together"
      rows={rows}
      rowId={({ month }) => month}
      columns={monthColumns}
    >
      <SeriesChart
        kind="columns"
        rows={rows}
        category={({ month }) => month}
        series={[{ label: 'Plays', value: ({ plays }) => plays }]}
        xLabel="Month"
        yLabel="Plays"
        height={240}
      />
    </ChartFrame>
  )
}
