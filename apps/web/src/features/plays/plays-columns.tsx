import type { EndpointOutput, listPlays, Role } from '@fieldfare/contracts'
import { useSearchParams } from 'react-router'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Code, Duration } from '../../components/figures.tsx'
import { RecordingName } from '../../components/recording-name.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatDay, formatInstant } from '../../lib/format-time.ts'

export type PlayRow = EndpointOutput<typeof listPlays>['items'][number]

/** The page's parameter that names the play being disputed. */
export const DISPUTE_PARAMETER = 'dispute'

function PlayState({ play }: { play: PlayRow }) {
  return (
    <span className="grid">
      {play.status === 'counted' ? (
        <StatusTag tone="good">Counted</StatusTag>
      ) : (
        <StatusTag tone="bad">Removed</StatusTag>
      )}
      {play.isInDispute && <StatusTag tone="warn">In dispute</StatusTag>}
    </span>
  )
}

function DisputeLink({ play }: { play: PlayRow }) {
  const [search] = useSearchParams()
  if (!play.canDispute) return null
  const next = new URLSearchParams(search)
  next.set(DISPUTE_PARAMETER, play.id)
  const started = formatInstant(play.startedAt, play.station.timeZone)
  return (
    <TextLink to={{ search: next.toString() }} aria-label={`Dispute ${play.recording.title}, ${started}`}>
      Dispute
    </TextLink>
  )
}

const started: DataColumn<PlayRow> = {
  id: 'startedAt',
  header: 'Starts',
  sortable: true,
  rowHeader: true,
  cell: (play) => (
    <StationTime instant={play.startedAt} timeZone={play.station.timeZone} precision="second" />
  ),
}

const startedWithEvidence: DataColumn<PlayRow> = {
  ...started,
  cell: (play) =>
    play.detectionId === null ? (
      started.cell(play)
    ) : (
      <TextLink to={`/detections/${play.detectionId}`}>{started.cell(play)}</TextLink>
    ),
}

const facts: readonly DataColumn<PlayRow>[] = [
  {
    id: 'station',
    header: 'Station',
    sortable: true,
    minWidth: '9rem',
    cell: (play) => play.station.name,
  },
  {
    id: 'title',
    header: 'Recording',
    sortable: true,
    minWidth: '13rem',
    cell: (play) => <RecordingName recording={play.recording} />,
  },
  {
    id: 'durationSeconds',
    header: 'Length',
    sortable: true,
    align: 'end',
    cell: (play) => <Duration seconds={play.durationSeconds} />,
  },
  { id: 'status', header: 'State', cell: (play) => <PlayState play={play} /> },
]

const moreFacts: readonly DataColumn<PlayRow>[] = [
  {
    id: 'work',
    header: 'Work',
    minWidth: '11rem',
    cell: (play) =>
      play.work === null ? <span className="text-slate">No work known</span> : play.work.title,
  },
  {
    id: 'isrc',
    header: 'ISRC',
    hiddenAtFirst: true,
    cell: (play) => <Code kind="isrc" value={play.recording.isrc} />,
  },
  { id: 'localDay', header: 'Booked on', hiddenAtFirst: true, cell: (play) => formatDay(play.localDay) },
]

const dispute: DataColumn<PlayRow> = {
  id: 'dispute',
  header: 'Dispute',
  cell: (play) => <DisputeLink play={play} />,
}

const withEvidence = [startedWithEvidence, ...facts, ...moreFacts] as const
const withEvidenceAndDispute = [startedWithEvidence, ...facts, dispute, ...moreFacts] as const
const withDispute = [started, ...facts, dispute, ...moreFacts] as const

/** The columns a role has a use for: evidence is for those who may hear it, disputes for those who may open them. */
export function playColumnsFor(role: Role): readonly DataColumn<PlayRow>[] {
  if (role === 'publisher') return withDispute
  return role === 'auditor' ? withEvidenceAndDispute : withEvidence
}
