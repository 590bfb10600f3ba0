import { getDetectionClip, type ClipSource, type DetectionDetail } from '@fieldfare/contracts'
import { ChevronLeft, ChevronRight, Pause, Play } from 'lucide-react'
import { useId, useState } from 'react'
import { Button } from '../../components/button.tsx'
import { ChoiceGroup, RadioField } from '../../components/choice-field.tsx'
import { Notice } from '../../components/notice.tsx'
import { ErrorState } from '../../components/states.tsx'
import { isApiProblem } from '../../lib/api-problem.ts'
import { downloadAddress } from '../../lib/endpoint-address.ts'
import { formatClock, formatZone } from '../../lib/format-time.ts'
import { formatDuration } from '../../lib/format.ts'
import { useStepPlayers, type ClipFailures } from './use-step-players.ts'

const PART_SECONDS = 30

type Hearing = ClipSource | 'both'

const hearingLabels = {
  log: 'The log',
  both: 'Both at once',
  reference: 'The reference',
} as const satisfies Record<Hearing, string>

const hearings = ['log', 'both', 'reference'] as const satisfies readonly Hearing[]
const bothSources = ['log', 'reference'] as const
const logOnly = ['log'] as const

/** The log and the reference from the same moment, played in step, half a minute at a time. */
export function ClipPlayers({ detection }: { detection: DetectionDetail }) {
  const [fromSeconds, setFromSeconds] = useState(0)
  const [hearing, setHearing] = useState<Hearing>('log')
  const hasLater = fromSeconds + PART_SECONDS < detection.durationSeconds
  return (
    <div className="grid max-w-3xl gap-4">
      {!detection.hasReferenceAudio && (
        <Notice title="No reference audio is kept">Only the log can be heard.</Notice>
      )}
      <PartPlayer key={fromSeconds} detection={detection} fromSeconds={fromSeconds} hearing={hearing} />
      {detection.hasReferenceAudio && (
        <ChoiceGroup legend="Hear">
          <div className="flex flex-wrap gap-x-6 gap-y-2">
            {hearings.map((choice) => (
              <RadioField
                key={choice}
                name="hearing"
                label={hearingLabels[choice]}
                checked={hearing === choice}
                onChange={() => setHearing(choice)}
              />
            ))}
          </div>
        </ChoiceGroup>
      )}
      {detection.durationSeconds > PART_SECONDS && (
        <div className="flex flex-wrap gap-2">
          <Button
            icon={ChevronLeft}
            disabled={fromSeconds === 0}
            onClick={() => setFromSeconds(fromSeconds - PART_SECONDS)}
          >
            Half a minute earlier
          </Button>
          <Button
            icon={ChevronRight}
            disabled={!hasLater}
            onClick={() => setFromSeconds(fromSeconds + PART_SECONDS)}
          >
            Half a minute later
          </Button>
        </div>
      )}
    </div>
  )
}

type PartPlayerProps = { detection: DetectionDetail; fromSeconds: number; hearing: Hearing }

function PartPlayer({ detection, fromSeconds, hearing }: PartPlayerProps) {
  const { id, hasReferenceAudio, durationSeconds, startedAt, station } = detection
  const sources: readonly ClipSource[] = hasReferenceAudio ? bothSources : logOnly
  const players = useStepPlayers(id, fromSeconds, sources)
  const { refs } = players
  const sliderId = useId()
  const length = Math.min(PART_SECONDS, durationSeconds - fromSeconds)
  const heardAt = Date.parse(startedAt) + (fromSeconds + players.position) * 1000
  return (
    <div className="grid gap-3">
      {sources.map((source) => (
        // eslint-disable-next-line jsx-a11y/media-has-caption -- a clip of music has no words to caption
        <audio
          key={source}
          ref={refs[source]}
          preload="none"
          src={downloadAddress(getDetectionClip, {
            params: { detectionId: id, source },
            query: { fromSeconds },
          })}
          muted={hearing !== 'both' && hearing !== source && hasReferenceAudio}
          onTimeUpdate={players.handleTime}
          onEnded={players.handleEnd}
        />
      ))}
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2 border-y border-ink py-3">
        {players.state === 'playing' ? (
          <Button icon={Pause} onClick={players.stop}>
            Pause
          </Button>
        ) : (
          <Button icon={Play} busy={players.state === 'fetching'} onClick={() => void players.start()}>
            {hasReferenceAudio ? 'Play both in step' : 'Play the log'}
          </Button>
        )}
        <label htmlFor={sliderId} className="sr-only">
          Position in the clip
        </label>
        <input
          id={sliderId}
          type="range"
          min={0}
          max={length}
          step={0.1}
          value={Math.min(players.position, length)}
          aria-valuetext={`${formatDuration(players.position)} of ${formatDuration(length)}`}
          onChange={(event) => players.seek(event.currentTarget.valueAsNumber)}
          className="min-w-40 grow accent-action"
        />
        <p className="figures text-slate">
          {formatClock(heardAt, station.timeZone, 'second')} {formatZone(startedAt, station.timeZone)}
        </p>
      </div>
      <p role="status" className="min-h-6 text-sm text-slate">
        {players.state === 'fetching' &&
          'Fetching the sound. The first time it is cut out for you, which takes a few seconds.'}
      </p>
      <Failures failures={players.failures} />
    </div>
  )
}

function Failures({ failures }: { failures: ClipFailures }) {
  return bothSources.map((source) => {
    const failure = failures[source]
    if (failure === undefined) return null
    return isApiProblem(failure) ? (
      <ErrorState key={source} error={failure} />
    ) : (
      <Notice key={source} tone="bad" announce title={`${hearingLabels[source]} could not be played`}>
        The clip is there, but this browser could not play it. Another browser may.
      </Notice>
    )
  })
}
