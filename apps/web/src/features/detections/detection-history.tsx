import type { DetectionDetail } from '@fieldfare/contracts'
import { EmptyState } from '../../components/states.tsx'
import { StationTime } from '../../components/station-time.tsx'

/** Who did what with this detection, newest last, with the reasons given. */
export function DetectionHistory({ detection }: { detection: DetectionDetail }) {
  if (detection.history.length === 0) {
    return (
      <EmptyState title="Nobody has done anything with it yet">
        Reviews, disputes and changes of its play are kept here with their reasons.
      </EmptyState>
    )
  }
  return (
    <ol className="divide-y divide-hairline border-y border-hairline">
      {detection.history.map((entry) => (
        <li key={`${entry.at} ${entry.what}`} className="grid gap-x-6 py-2">
          <StationTime instant={entry.at} timeZone={detection.station.timeZone} />
          <div>
            <p>
              <span className="font-semibold">{entry.what}</span>{' '}
              <span className="text-slate">by {entry.actorName}</span>
            </p>
            {entry.reason !== null && <p>{entry.reason}</p>}
          </div>
        </li>
      ))}
    </ol>
  )
}
