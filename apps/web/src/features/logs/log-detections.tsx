import type { DetectionView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { DataTable } from '../../components/data-table.tsx'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Confidence, ReviewStateTag } from '../../components/detection-marks.tsx'
import { Duration } from '../../components/figures.tsx'
import { RecordingName } from '../../components/recording-name.tsx'
import { EmptyState } from '../../components/states.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { detectionsOfLogQuery } from './logs-queries.ts'

const columns: readonly DataColumn<DetectionView>[] = [
  {
    id: 'startedAt',
    header: 'Starts',
    sortable: true,
    rowHeader: true,
    cell: (detection) => (
      <TextLink to={`/detections/${detection.id}`}>
        <StationTime
          instant={detection.startedAt}
          timeZone={detection.station.timeZone}
          precision="second"
          clockOnly
        />
      </TextLink>
    ),
  },
  {
    id: 'title',
    header: 'Recording',
    sortable: true,
    minWidth: '12rem',
    cell: (detection) => <RecordingName recording={detection.recording} />,
  },
  {
    id: 'durationSeconds',
    header: 'Length',
    sortable: true,
    align: 'end',
    cell: (detection) => <Duration seconds={detection.durationSeconds} />,
  },
  {
    id: 'confidence',
    header: 'False alarms',
    sortable: true,
    align: 'end',
    cell: (detection) => <Confidence confidence={detection.confidence} />,
  },
  {
    id: 'state',
    header: 'State',
    cell: (detection) => <ReviewStateTag state={detection.reviewState} />,
  },
]

export function LogDetections({ logId }: { logId: string }) {
  const search = useListSearch({ filters: [], sort: 'startedAt' })
  const detections = useQuery(detectionsOfLogQuery({ ...search.query, logId }))
  return (
    <DataTable
      name="log-detections"
      caption="Detections in this log, in the order they were heard"
      captionHidden
      noun="detections"
      columns={columns}
      query={detections}
      rowId={(detection) => detection.id}
      search={search}
      empty={
        <EmptyState title="No recording of the catalogue was found in this log">
          Music that is not in the catalogue yet, or has no reference audio, cannot be found. Once it is
          there, a clerk can analyse the log again.
        </EmptyState>
      }
    />
  )
}
