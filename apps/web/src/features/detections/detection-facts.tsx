import type { DetectionDetail } from '@fieldfare/contracts'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Code, Count, Duration } from '../../components/figures.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { RecordingName } from '../../components/recording-name.tsx'
import { explainConfidence, explainSpeed } from './detection-words.ts'

function PlayState({ play }: Pick<DetectionDetail, 'play'>) {
  if (play === null) return 'None; it counts once the detection is confirmed.'
  return play.status === 'counted' ? (
    <StatusTag tone="good">Counted</StatusTag>
  ) : (
    <StatusTag tone="bad">Removed</StatusTag>
  )
}

/** What was found, where and when, and how sure that is. */
export function DetectionFacts({ detection }: { detection: DetectionDetail }) {
  const { station, recording, startedAt, endedAt } = detection
  return (
    <DefinitionList
      items={[
        { term: 'Recording', value: <RecordingName recording={recording} /> },
        { term: 'ISRC', value: <Code kind="isrc" value={recording.isrc} /> },
        { term: 'Station', value: <TextLink to={`/stations/${station.id}`}>{station.name}</TextLink> },
        {
          term: 'Starts',
          value: <StationTime instant={startedAt} timeZone={station.timeZone} precision="second" withUtc />,
        },
        {
          term: 'Ends',
          value: <StationTime instant={endedAt} timeZone={station.timeZone} precision="second" withUtc />,
        },
        { term: 'Length', value: <Duration seconds={detection.durationSeconds} /> },
        {
          term: 'In the log',
          value: (
            <TextLink to={`/logs/${detection.logId}`}>
              <Duration seconds={detection.logStartSeconds} /> into the log
            </TextLink>
          ),
        },
        {
          term: 'In the reference',
          value: (
            <>
              <Duration seconds={detection.referenceStartSeconds} /> into the reference
            </>
          ),
        },
        { term: 'How sure', value: explainConfidence(detection.confidence) },
        { term: 'Agreeing moments', value: <Count value={detection.agreeingHashes} /> },
        { term: 'Broadcast at', value: explainSpeed(detection.speedRatio) },
        { term: 'Play', value: <PlayState play={detection.play} /> },
        { term: 'Engine', value: <span className="figures">{detection.engineVersion}</span> },
      ]}
    />
  )
}
