import {
  Bar,
  BarChart,
  CartesianGrid,
  Line,
  LineChart,
  ResponsiveContainer,
  Tooltip,
  XAxis,
  YAxis,
} from 'recharts'
import { axisLabel, chartAxis, chartInk, chartTooltip } from './chart-look.ts'

export type Series<Row> = { label: string; value: (row: Row) => number }

export type SeriesChartProps<Row> = {
  kind: 'columns' | 'stacked' | 'lines'
  rows: readonly Row[]
  /** The label of a row on the x axis. */
  category: (row: Row) => string
  /** At most three. */
  series: readonly [Series<Row>, ...Series<Row>[]]
  xLabel: string
  /** With the unit: "Airtime (hours)". */
  yLabel: string
  height?: number
}

const inks = [chartInk.first, chartInk.second, chartInk.third] as const
const dashes = ['0', '6 4', '2 3'] as const
const margin = { top: 8, right: 8, bottom: 20, left: 12 }

/** Columns or lines in the house's ink; put it into a ChartFrame, which carries title and table. */
export function SeriesChart<Row>(props: SeriesChartProps<Row>) {
  const { kind, rows, category, series, xLabel, yLabel, height = 280 } = props
  const data = rows.map((row) => ({
    category: category(row),
    ...Object.fromEntries(series.map((one, index) => [`series${index}`, one.value(row)])),
  }))
  const shared = (
    <>
      <CartesianGrid vertical={false} stroke={chartInk.grid} />
      <XAxis dataKey="category" {...chartAxis} label={axisLabel(xLabel, 'x')} height={48} minTickGap={12} />
      <YAxis {...chartAxis} label={axisLabel(yLabel, 'y')} width={72} />
      <Tooltip {...chartTooltip} />
    </>
  )
  return (
    <>
      {series.length > 1 && <SeriesKey series={series} />}
      <ResponsiveContainer width="100%" height={height}>
        {kind === 'lines' ? (
          // The picture is hidden from readers (its table is not), so nothing in it may take the focus.
          <LineChart data={data} margin={margin} accessibilityLayer={false}>
            {shared}
            {series.map((one, index) => (
              <Line
                key={one.label}
                dataKey={`series${index}`}
                name={one.label}
                stroke={inks[index] ?? chartInk.first}
                strokeDasharray={dashes[index] ?? '0'}
                strokeWidth={2}
                dot={false}
                isAnimationActive={false}
              />
            ))}
          </LineChart>
        ) : (
          <BarChart data={data} margin={margin} accessibilityLayer={false}>
            {shared}
            {series.map((one, index) => (
              <Bar
                key={one.label}
                dataKey={`series${index}`}
                name={one.label}
                fill={inks[index] ?? chartInk.first}
                {...(kind === 'stacked' ? { stackId: 'all' } : {})}
                isAnimationActive={false}
              />
            ))}
          </BarChart>
        )}
      </ResponsiveContainer>
    </>
  )
}

function SeriesKey<Row>({ series }: { series: readonly Series<Row>[] }) {
  return (
    <ul className="flex flex-wrap gap-x-5 text-sm">
      {series.map((one, index) => (
        <li key={one.label} className="flex items-center gap-2">
          <svg viewBox="0 0 24 4" className="h-1 w-6">
            <line
              x2="24"
              y1="2"
              y2="2"
              strokeWidth="4"
              stroke={inks[index] ?? chartInk.first}
              strokeDasharray={dashes[index] ?? '0'}
            />
          </svg>
          {one.label}
        </li>
      ))}
    </ul>
  )
}
