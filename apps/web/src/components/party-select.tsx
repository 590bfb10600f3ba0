import { formatIpi, listParties, partyIdSchema, type PartyId } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { callApi } from '../lib/api-client.ts'
import type { FieldLook } from './field-shell.tsx'
import { SearchSelect } from './search-select.tsx'

const SHOWN_CHOICES = 20

function partyChoicesQuery(search: string) {
  return queryOptions({
    queryKey: ['parties', 'choices', search],
    queryFn: ({ signal }) =>
      callApi(listParties, { query: { search, pageSize: SHOWN_CHOICES, sort: 'name' }, signal }),
    staleTime: 30_000,
    placeholderData: keepPreviousData,
  })
}

export type ChosenParty = { id: PartyId; name: string }

export type PartySelectProps = FieldLook & {
  selected: { id: string; name: string } | null
  onSelect: (party: ChosenParty | null) => void
  onBlur?: () => void
}

/** One interested party, found by a part of its name or IPI. */
export function PartySelect({ selected, onSelect, ...look }: PartySelectProps) {
  const [search, setSearch] = useState('')
  const parties = useQuery(partyChoicesQuery(search))
  return (
    <SearchSelect
      {...look}
      placeholder="Name or IPI"
      selected={selected === null ? null : { id: selected.id, label: selected.name }}
      onSelect={(option) =>
        onSelect(option === null ? null : { id: partyIdSchema.parse(option.id), name: option.label })
      }
      options={(parties.data?.items ?? []).map((party) => ({
        id: party.id,
        label: party.name,
        detail: party.ipi === null ? undefined : `IPI ${formatIpi(party.ipi)}`,
      }))}
      isFetching={parties.isFetching}
      onSearch={setSearch}
    />
  )
}
