import { useQuery } from '@tanstack/react-query'
import { PartySelect } from '../../components/party-select.tsx'
import { partyQuery } from './catalogue-queries.ts'

/** Narrows a list to what one party has a share in. */
export function PartyFilter({ value, onChange }: { value: string; onChange: (value: string) => void }) {
  const party = useQuery({ ...partyQuery(value), enabled: value !== '' })
  const selected = value === '' ? null : { id: value, name: party.data?.name ?? '' }
  return (
    <div className="w-full sm:w-64 [&_label]:overline-label">
      <PartySelect label="Party" selected={selected} onSelect={(chosen) => onChange(chosen?.id ?? '')} />
    </div>
  )
}
