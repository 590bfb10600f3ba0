import type { CsvColumn } from '../../http/csv.ts'
import type { PlayRow } from '../../records/play.repository.ts'

export const playCsvColumns: readonly CsvColumn<PlayRow>[] = [
  { header: 'Station', value: (play) => play.station.callName },
  { header: 'Station name', value: (play) => play.station.name },
  { header: 'Local day', value: (play) => play.localDay },
  { header: 'Started at (UTC)', value: (play) => play.startedAt },
  { header: 'Ended at (UTC)', value: (play) => play.endedAt },
  { header: 'Seconds', value: (play) => play.durationSeconds },
  { header: 'Title', value: (play) => play.recording.title },
  { header: 'Artist', value: (play) => play.recording.artist },
  { header: 'ISRC', value: (play) => play.recording.isrc },
  { header: 'Work', value: (play) => play.work?.title ?? null },
  { header: 'ISWC', value: (play) => play.work?.iswc ?? null },
  { header: 'Status', value: (play) => play.status },
  { header: 'In dispute', value: (play) => (play.openDisputeId === null ? 'no' : 'yes') },
  { header: 'Play', value: (play) => play.id },
]
