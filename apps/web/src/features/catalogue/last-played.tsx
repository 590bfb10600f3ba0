import { SocietyTime } from '../../components/society-time.tsx'

/** Plays lie at stations in several zones; the day is told as it was at the society. */
export function LastPlayed({ instant }: { instant: string | null }) {
  if (instant === null) return <span className="text-slate">Never</span>
  return <SocietyTime instant={instant} precision="day" />
}
