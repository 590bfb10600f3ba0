import type { DetectionView } from '@fieldfare/contracts'
import { useLocation } from 'react-router'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Confidence, ReviewStateTag } from '../../components/detection-marks.tsx'
import { Code, Duration } from '../../components/figures.tsx'
import { RecordingName } from '../../components/recording-name.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'

function DetectionLink({ detection }: { detection: DetectionView }) {
  const { search } = useLocation()
  return (
    <TextLink to={{ pathname: `/detections/${detection.id}`, search: search === '' ? '?page=1' : search }}>
      <StationTime instant={detection.startedAt} timeZone={detection.station.timeZone} precision="second" />
    </TextLink>
  )
}

function PlayMark({ detection }: { detection: DetectionView }) {
  if (detection.play === null) return <span className="text-slate">No play</span>
  return detection.play.status === 'counted' ? 'Counted' : 'Removed'
}

export const detectionColumns: readonly DataColumn<DetectionView>[] = [
  {
    id: 'startedAt',
    header: 'Starts',
    sortable: true,
    rowHeader: true,
    cell: (detection) => <DetectionLink detection={detection} />,
  },
  {
    id: 'station',
    header: 'Station',
    sortable: true,
    minWidth: '9rem',
    cell: (detection) => detection.station.name,
  },
  {
    id: 'title',
    header: 'Recording',
    sortable: true,
    minWidth: '13rem',
    cell: (detection) => <RecordingName recording={detection.recording} />,
  },
  {
    id: 'isrc',
    header: 'ISRC',
    hiddenAtFirst: true,
    cell: (detection) => <Code kind="isrc" value={detection.recording.isrc} />,
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
    cell: (detection) => (
      <span className="grid">
        <ReviewStateTag state={detection.reviewState} />
        {detection.openDisputeId !== null && <StatusTag tone="warn">In dispute</StatusTag>}
      </span>
    ),
  },
  {
    id: 'play',
    header: 'Play',
    hiddenAtFirst: true,
    cell: (detection) => <PlayMark detection={detection} />,
  },
]
