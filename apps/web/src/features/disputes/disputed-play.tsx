import { getDetection, type DisputeView } from '@fieldfare/contracts'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Code } from '../../components/figures.tsx'
import { RecordingName } from '../../components/recording-name.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatMonth } from '../../lib/format-time.ts'
import { useRole } from '../../lib/session.ts'

/** The play in question: what, where, when, and the way to its evidence. */
export function DisputedPlay({ dispute }: { dispute: DisputeView }) {
  const role = useRole()
  const { station, recording, detectionId, isMonthOpen } = dispute
  const mayHear = detectionId !== null && getDetection.access.some((reader) => reader === role)
  return (
    <DefinitionList
      items={[
        { term: 'Recording', value: <RecordingName recording={recording} /> },
        { term: 'ISRC', value: <Code kind="isrc" value={recording.isrc} /> },
        { term: 'Station', value: `${station.name} (${station.callName}), ${station.timeZone}` },
        {
          term: 'From',
          value: (
            <StationTime instant={dispute.startedAt} timeZone={station.timeZone} precision="second" withUtc />
          ),
        },
        {
          term: 'To',
          value: (
            <StationTime instant={dispute.endedAt} timeZone={station.timeZone} precision="second" withUtc />
          ),
        },
        {
          term: 'The play',
          value:
            dispute.play.status === 'counted' ? (
              <StatusTag tone="good">Counted</StatusTag>
            ) : (
              <StatusTag tone="bad">Removed</StatusTag>
            ),
        },
        {
          term: 'Month',
          value: `${formatMonth(dispute.month)}, ${isMonthOpen ? 'open: plays can still change' : 'closed: its plays do not change'}`,
        },
        mayHear
          ? {
              term: 'Evidence',
              value: <TextLink to={`/detections/${detectionId}`}>Hear and see the detection</TextLink>,
            }
          : null,
      ]}
    />
  )
}
