import { StationTime } from '../../components/station-time.tsx'
import { useSociety } from '../../lib/society.tsx'

/** Plays lie at stations in several zones; the day is told as it was at the society. */
export function LastPlayed({ instant }: { instant: string | null }) {
  const society = useSociety()
  if (instant === null) return <span className="text-slate">Never</span>
  return <StationTime instant={instant} timeZone={society?.timeZone ?? 'UTC'} precision="day" />
}
