import { StationTime } from '../../components/station-time.tsx'
import { useSociety } from '../../lib/society.tsx'

/** When an import ran, as it was at the society. */
export function ImportedAt({ instant }: { instant: string }) {
  const society = useSociety()
  return <StationTime instant={instant} timeZone={society?.timeZone ?? 'UTC'} />
}
