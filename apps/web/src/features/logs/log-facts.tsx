import type { StationLogView } from '@fieldfare/contracts'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Count, Duration, Percent } from '../../components/figures.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { formatBytes } from '../../lib/format.ts'

function airtime(term: string, seconds: number | null) {
  return seconds === null ? null : { term, value: <Duration seconds={seconds} /> }
}

/** What is known of a log as a file and as airtime. */
export function LogFacts({ log }: { log: StationLogView }) {
  const { timeZone } = log.station
  const { musicSeconds, identifiedSeconds } = log
  const isShareKnown = musicSeconds !== null && identifiedSeconds !== null && musicSeconds > 0
  return (
    <DefinitionList
      items={[
        {
          term: 'Station',
          value: <TextLink to={`/stations/${log.station.id}`}>{log.station.name}</TextLink>,
        },
        {
          term: 'Begins',
          value: <StationTime instant={log.startedAt} timeZone={timeZone} precision="second" withUtc />,
        },
        log.endedAt === null
          ? null
          : {
              term: 'Ends',
              value: <StationTime instant={log.endedAt} timeZone={timeZone} precision="second" withUtc />,
            },
        airtime('Length', log.durationSeconds),
        airtime('Music', musicSeconds),
        airtime('Music identified', identifiedSeconds),
        isShareKnown
          ? { term: 'Share of music identified', value: <Percent ratio={identifiedSeconds / musicSeconds} /> }
          : null,
        airtime('Speech', log.speechSeconds),
        airtime('Silence', log.silenceSeconds),
        { term: 'Detections', value: <Count value={log.detections} /> },
        { term: 'File', value: <span className="break-all">{log.fileName}</span> },
        { term: 'Size', value: <span className="figures">{formatBytes(log.sizeBytes)}</span> },
        log.format === null ? null : { term: 'Format', value: log.format },
        {
          term: 'Sent',
          value: (
            <>
              <StationTime instant={log.uploadedAt} timeZone={timeZone} /> by {log.uploadedByName}
            </>
          ),
        },
        log.analysedAt === null
          ? null
          : { term: 'Analysed', value: <StationTime instant={log.analysedAt} timeZone={timeZone} /> },
      ]}
    />
  )
}
