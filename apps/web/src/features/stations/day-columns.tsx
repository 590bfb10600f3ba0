import { getDetection } from '@fieldfare/contracts'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Duration } from '../../components/figures.tsx'
import { ribbonKindLabels, type RibbonSpan } from '../../components/ribbon/ribbon-spans.ts'
import { StationTime } from '../../components/station-time.tsx'
import { StatusTag, type StatusTone } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatHours } from '../../lib/format.ts'
import { useRole } from '../../lib/session.ts'

export type DayRow = RibbonSpan & { timeZone: string }

const LONG_SECONDS = 3600

function toneOf(kind: DayRow['kind']): StatusTone {
  if (kind === 'play') return 'good'
  if (kind === 'review') return 'warn'
  return kind === 'gap' ? 'bad' : 'calm'
}

function clock(row: DayRow, timeMs: number) {
  return (
    <StationTime
      instant={new Date(timeMs).toISOString()}
      timeZone={row.timeZone}
      precision="second"
      clockOnly
    />
  )
}

function StartLink({ row }: { row: DayRow }) {
  const role = useRole()
  const start = clock(row, row.fromMs)
  if (!getDetection.access.some((reader) => reader === role)) return start
  if (row.detectionId !== null) return <TextLink to={`/detections/${row.detectionId}`}>{start}</TextLink>
  return row.logId === null ? start : <TextLink to={`/logs/${row.logId}`}>{start}</TextLink>
}

export const dayColumns: readonly DataColumn<DayRow>[] = [
  { id: 'from', header: 'From', rowHeader: true, cell: (row) => <StartLink row={row} /> },
  { id: 'to', header: 'To', cell: (row) => clock(row, row.toMs) },
  {
    id: 'length',
    header: 'Length',
    align: 'end',
    cell: (row) => {
      const seconds = (row.toMs - row.fromMs) / 1000
      return seconds >= LONG_SECONDS ? (
        <span className="figures">{formatHours(seconds)}</span>
      ) : (
        <Duration seconds={seconds} />
      )
    },
  },
  {
    id: 'kind',
    header: 'What it is',
    cell: (row) => <StatusTag tone={toneOf(row.kind)}>{ribbonKindLabels[row.kind]}</StatusTag>,
  },
  {
    id: 'label',
    header: 'Heard',
    minWidth: '12rem',
    cell: (row) => row.label ?? <span className="text-slate">Nothing named</span>,
  },
]
