import { getDetection, type PlayView } from '@fieldfare/contracts'
import { MessageSquareWarning } from 'lucide-react'
import { Button } from '../../components/button.tsx'
import { Duration } from '../../components/figures.tsx'
import { OpenDisputeForm } from '../../components/open-dispute-form.tsx'
import { RecordingName } from '../../components/recording-name.tsx'
import { StationTime } from '../../components/station-time.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { useRole } from '../../lib/session.ts'

type LinePlayProps = { play: PlayView; isDisputing: boolean; onDispute: (isOn: boolean) => void }

/** One play: where, when, how long; and the way to its sound or to a dispute. */
export function LinePlay({ play, isDisputing, onDispute }: LinePlayProps) {
  const { station } = play
  return (
    <li className="grid gap-3 py-3">
      <div className="grid items-start gap-x-6 gap-y-1 sm:grid-cols-[minmax(0,1.2fr)_minmax(0,1fr)_5rem_minmax(10rem,auto)]">
        <RecordingName recording={play.recording} />
        <p>
          <StationTime instant={play.startedAt} timeZone={station.timeZone} precision="second" />
          <span className="block text-sm text-slate">
            {station.name}, {station.timeZone}
          </span>
        </p>
        <p className="sm:text-right">
          <Duration seconds={play.durationSeconds} />
        </p>
        <div className="flex flex-wrap items-center gap-x-4 gap-y-1 sm:justify-end">
          <PlayState play={play} />
          <EvidenceLink play={play} />
          {play.canDispute && !isDisputing && (
            <Button tone="quiet" icon={MessageSquareWarning} onClick={() => onDispute(true)}>
              Dispute
            </Button>
          )}
        </div>
      </div>
      {isDisputing && <OpenDisputeForm playId={play.id} onCancel={() => onDispute(false)} />}
    </li>
  )
}

function PlayState({ play }: { play: PlayView }) {
  if (play.isInDispute) return <StatusTag tone="warn">In dispute</StatusTag>
  if (play.status === 'removed') return <StatusTag tone="bad">Removed since</StatusTag>
  return null
}

function EvidenceLink({ play }: { play: PlayView }) {
  const role = useRole()
  const isOpen = getDetection.access.some((reader) => reader === role)
  if (play.detectionId === null || !isOpen) return null
  return <TextLink to={`/detections/${play.detectionId}`}>Hear it</TextLink>
}
