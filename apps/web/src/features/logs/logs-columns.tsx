import type { StationLogView } from '@fieldfare/contracts'
import type { DataColumn } from '../../components/data-table-model.ts'
import { Count, Duration, Percent } from '../../components/figures.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatBytes } from '../../lib/format.ts'
import { LogState } from './log-state.tsx'

function IdentifiedShare({ log }: { log: StationLogView }) {
  if (log.musicSeconds === null || log.identifiedSeconds === null) {
    return <span className="whitespace-nowrap text-slate">Not yet</span>
  }
  if (log.musicSeconds === 0) return <span className="text-slate">No music</span>
  return <Percent ratio={log.identifiedSeconds / log.musicSeconds} />
}

export const logColumns: readonly DataColumn<StationLogView>[] = [
  {
    id: 'startedAt',
    header: 'Starts',
    sortable: true,
    rowHeader: true,
    cell: (log) => (
      <>
        <TextLink to={`/logs/${log.id}`}>
          <StationTime instant={log.startedAt} timeZone={log.station.timeZone} precision="second" />
        </TextLink>
        <span className="block text-sm break-all text-slate">{log.fileName}</span>
      </>
    ),
  },
  { id: 'status', header: 'State', minWidth: '14rem', fixed: true, cell: (log) => <LogState log={log} /> },
  { id: 'station', header: 'Station', sortable: true, minWidth: '9rem', cell: (log) => log.station.name },
  {
    id: 'durationSeconds',
    header: 'Length',
    sortable: true,
    align: 'end',
    cell: (log) =>
      log.durationSeconds === null ? (
        <span className="whitespace-nowrap text-slate">Not read</span>
      ) : (
        <Duration seconds={log.durationSeconds} />
      ),
  },
  { id: 'detections', header: 'Found', align: 'end', cell: (log) => <Count value={log.detections} /> },
  {
    id: 'identified',
    header: 'Music identified',
    align: 'end',
    cell: (log) => <IdentifiedShare log={log} />,
  },
  {
    id: 'sizeBytes',
    header: 'Size',
    align: 'end',
    hiddenAtFirst: true,
    cell: (log) => <span className="figures">{formatBytes(log.sizeBytes)}</span>,
  },
  {
    id: 'uploadedAt',
    header: 'Sent',
    sortable: true,
    hiddenAtFirst: true,
    cell: (log) => <StationTime instant={log.uploadedAt} timeZone={log.station.timeZone} />,
  },
  { id: 'uploadedBy', header: 'Sent by', hiddenAtFirst: true, cell: (log) => log.uploadedByName },
]
