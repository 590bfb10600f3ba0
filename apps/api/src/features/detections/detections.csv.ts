import { reviewStateLabels } from '@fieldfare/contracts'
import type { CsvColumn } from '../../http/csv.ts'
import type { DetectionRow } from './detections.repository.ts'

export const detectionCsvColumns: readonly CsvColumn<DetectionRow>[] = [
  { header: 'Station', value: (detection) => detection.station.callName },
  { header: 'Station name', value: (detection) => detection.station.name },
  { header: 'Started at (UTC)', value: (detection) => detection.startedAt },
  { header: 'Ended at (UTC)', value: (detection) => detection.endedAt },
  { header: 'Seconds', value: (detection) => detection.durationSeconds },
  { header: 'Title', value: (detection) => detection.recording.title },
  { header: 'Artist', value: (detection) => detection.recording.artist },
  { header: 'ISRC', value: (detection) => detection.recording.isrc },
  { header: 'Confidence', value: (detection) => detection.confidence },
  { header: 'Expected false alarms', value: (detection) => detection.expectedFalseAlarms },
  { header: 'State', value: (detection) => reviewStateLabels[detection.reviewState] },
  { header: 'Play', value: (detection) => detection.play?.status ?? 'none' },
  { header: 'Detection', value: (detection) => detection.id },
]
