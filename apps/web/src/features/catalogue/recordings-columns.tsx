import type { RecordingView } from '@fieldfare/contracts'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Code, Count, Duration } from '../../components/figures.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatHours } from '../../lib/format.ts'
import { ClaimedToday } from './claimed-today.tsx'
import { LastPlayed } from './last-played.tsx'
import { ReferenceStatusTag } from './reference-status.tsx'

export const recordingColumns: readonly DataColumn<RecordingView>[] = [
  {
    id: 'title',
    header: 'Title',
    sortable: true,
    rowHeader: true,
    minWidth: '14rem',
    cell: (recording) => <TextLink to={`/recordings/${recording.id}`}>{recording.title}</TextLink>,
  },
  { id: 'artist', header: 'Artist', sortable: true, minWidth: '8rem', cell: (recording) => recording.artist },
  {
    id: 'isrc',
    header: 'ISRC',
    sortable: true,
    cell: (recording) => <Code kind="isrc" value={recording.isrc} />,
  },
  {
    id: 'length',
    header: 'Length',
    align: 'end',
    hiddenAtFirst: true,
    cell: (recording) =>
      recording.durationSeconds === null ? '–' : <Duration seconds={recording.durationSeconds} />,
  },
  {
    id: 'reference',
    header: 'Reference audio',
    cell: (recording) => <ReferenceStatusTag status={recording.referenceStatus} />,
  },
  {
    id: 'claimed',
    header: 'Claimed today',
    cell: (recording) => <ClaimedToday ppm={recording.shares.totalTodayPpm} />,
  },
  {
    id: 'plays',
    header: 'Plays',
    sortable: true,
    align: 'end',
    cell: (recording) => <Count value={recording.plays} />,
  },
  {
    id: 'airtime',
    header: 'Airtime',
    align: 'end',
    hiddenAtFirst: true,
    cell: (recording) => <span className="figures">{formatHours(recording.playedSeconds)}</span>,
  },
  {
    id: 'lastPlayedAt',
    header: 'Last played',
    sortable: true,
    cell: (recording) => <LastPlayed instant={recording.lastPlayedAt} />,
  },
  {
    id: 'work',
    header: 'Work',
    hiddenAtFirst: true,
    cell: (recording) =>
      recording.work === null ? (
        '–'
      ) : (
        <TextLink to={`/works/${recording.work.id}`}>{recording.work.title}</TextLink>
      ),
  },
]
