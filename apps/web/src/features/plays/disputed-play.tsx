import { useEffect, useId, useRef } from 'react'
import { Duration } from '../../components/figures.tsx'
import { OpenDisputeForm } from '../../components/open-dispute-form.tsx'
import { StationTime } from '../../components/station-time.tsx'
import type { PlayRow } from './plays-columns.tsx'

/** The play being disputed and the form for it, above the list it was chosen from. */
export function DisputedPlay({ play, onCancel }: { play: PlayRow; onCancel: () => void }) {
  const titleId = useId()
  const panel = useRef<HTMLElement>(null)
  useEffect(() => {
    // The link stands below in the list: go to what it opened.
    panel.current?.querySelector('textarea')?.focus()
  }, [])
  return (
    <section
      ref={panel}
      aria-labelledby={titleId}
      className="mb-8 grid gap-4 border-y border-ink bg-band px-4 py-5"
    >
      <div>
        <h2 id={titleId}>Dispute this play</h2>
        <p className="mt-1">
          <strong>{play.recording.title}</strong> by {play.recording.artist}, {play.station.name},{' '}
          <StationTime instant={play.startedAt} timeZone={play.station.timeZone} precision="second" />,{' '}
          <Duration seconds={play.durationSeconds} /> long
        </p>
      </div>
      <OpenDisputeForm playId={play.id} onCancel={onCancel} />
    </section>
  )
}
