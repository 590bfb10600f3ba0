import type { MonthOverview } from '@fieldfare/contracts'
import { ChartFrame, type ChartColumn } from '../../components/chart-frame.tsx'
import { Count } from '../../components/figures.tsx'
import { SeriesChart, type Series } from '../../components/series-chart.tsx'
import { formatDay } from '../../lib/format-time.ts'
import { formatHours } from '../../lib/format.ts'
import { chartHours, partsOf, type Airtime } from './airtime.ts'

type AirtimeRow = Airtime & { plays: number }
type DayRow = MonthOverview['days'][number]
type HourRow = MonthOverview['hours'][number]

const parts: readonly [Series<AirtimeRow>, ...Series<AirtimeRow>[]] = [
  { label: 'Music identified', value: (row) => chartHours(partsOf(row).identified) },
  { label: 'Music not identified', value: (row) => chartHours(partsOf(row).unidentified) },
  { label: 'Other airtime held', value: (row) => chartHours(partsOf(row).other) },
]

function hours(seconds: number) {
  return <span className="figures">{formatHours(seconds)}</span>
}

const airtimeColumns: readonly ChartColumn<AirtimeRow>[] = [
  { header: 'Music identified', align: 'end', cell: (row) => hours(partsOf(row).identified) },
  { header: 'Music not identified', align: 'end', cell: (row) => hours(partsOf(row).unidentified) },
  { header: 'Other airtime held', align: 'end', cell: (row) => hours(partsOf(row).other) },
  { header: 'Plays', align: 'end', cell: ({ plays }) => <Count value={plays} /> },
]

const dayColumns: readonly ChartColumn<DayRow>[] = [
  { header: 'Day', cell: ({ day }) => formatDay(day) },
  ...airtimeColumns,
]

const hourColumns: readonly ChartColumn<HourRow>[] = [
  { header: 'Hour', cell: ({ hour }) => <span className="figures">{clockHour(hour)}</span> },
  ...airtimeColumns,
]

function clockHour(hour: number): string {
  return `${String(hour).padStart(2, '0')}:00`
}

function daysTitle(days: readonly DayRow[]): string {
  const held = days.filter(({ heldSeconds }) => heldSeconds > 0).length
  return `Airtime is held on ${held} of ${days.length} days`
}

function hoursTitle(hoursOfDay: readonly HourRow[]): string {
  const [first] = [...hoursOfDay].sort((one, other) => other.identifiedSeconds - one.identifiedSeconds)
  return first === undefined || first.identifiedSeconds === 0
    ? 'No identified music in any hour'
    : `Most identified music was heard from ${clockHour(first.hour)} to ${clockHour((first.hour + 1) % 24)}`
}

/** Held airtime by day and by the hour of the stations' clocks. */
export function AirtimeCharts({ overview: { days, hours: hoursOfDay } }: { overview: MonthOverview }) {
  return (
    <div className="grid gap-x-12 gap-y-8 xl:grid-cols-2">
      <ChartFrame
        title={daysTitle(days)}
        lead="All stations together, by day of the stations’ calendars."
        rows={days}
        rowId={({ day }) => day}
        columns={dayColumns}
      >
        <SeriesChart
          kind="stacked"
          rows={days}
          category={({ day }) => String(Number(day.slice(8)))}
          series={parts}
          xLabel="Day of the month"
          yLabel="Airtime (hours)"
        />
      </ChartFrame>
      <ChartFrame
        title={hoursTitle(hoursOfDay)}
        lead="All stations and days together, by hour of the stations’ clocks."
        rows={hoursOfDay}
        rowId={({ hour }) => String(hour)}
        columns={hourColumns}
      >
        <SeriesChart
          kind="stacked"
          rows={hoursOfDay}
          category={({ hour }) => clockHour(hour)}
          series={parts}
          xLabel="Hour of the day"
          yLabel="Airtime (hours)"
        />
      </ChartFrame>
    </div>
  )
}
