import { useSociety } from '../lib/society.tsx'
import { StationTime } from './station-time.tsx'

export type SocietyTimeProps = { instant: string; precision?: 'day' | 'minute' | 'second' }

/** When something was done at the desk or in the office: told by the society's clock, not a station's. */
export function SocietyTime({ instant, precision = 'minute' }: SocietyTimeProps) {
  const society = useSociety()
  return <StationTime instant={instant} timeZone={society?.timeZone ?? 'UTC'} precision={precision} />
}
