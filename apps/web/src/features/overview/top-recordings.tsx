import type { MonthOverview } from '@fieldfare/contracts'
import { useMemo } from 'react'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Code, Count } from '../../components/figures.tsx'
import { RecordingName } from '../../components/recording-name.tsx'
import { EmptyState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatHours } from '../../lib/format.ts'

type RecordingRow = MonthOverview['topRecordings'][number] & { month: string }

const columns: readonly DataColumn<RecordingRow>[] = [
  {
    id: 'recording',
    header: 'Recording',
    rowHeader: true,
    minWidth: '13rem',
    cell: ({ recording }) => <RecordingName recording={recording} />,
  },
  { id: 'isrc', header: 'ISRC', cell: ({ recording }) => <Code kind="isrc" value={recording.isrc} /> },
  {
    id: 'plays',
    header: 'Plays',
    align: 'end',
    cell: ({ recording, month, plays }) => (
      <TextLink to={`/plays?recordingId=${recording.id}&month=${month}`}>
        <Count value={plays} />
      </TextLink>
    ),
  },
  {
    id: 'airtime',
    header: 'Airtime',
    align: 'end',
    cell: ({ seconds }) => <span className="figures">{formatHours(seconds)}</span>,
  },
]

export function TopRecordings({ overview }: { overview: MonthOverview }) {
  const { topRecordings, month } = overview
  const query = useMemo(
    () => ({
      data: { items: topRecordings.map((row): RecordingRow => ({ ...row, month })) },
      error: null,
      isFetching: false,
      refetch: () => undefined,
    }),
    [topRecordings, month],
  )
  return (
    <DataTable
      name="month-recordings"
      caption="The recordings played most"
      captionHidden
      noun="recordings"
      columns={columns}
      query={query}
      rowId={(row) => row.recording.id}
      empty={
        <EmptyState
          title="No recording was found in this month"
          action={<LinkButton to={`/logs?month=${month}`}>See its station logs</LinkButton>}
        >
          Recordings appear here once a log was analysed and one of the catalogue was heard in it.
        </EmptyState>
      }
    />
  )
}
