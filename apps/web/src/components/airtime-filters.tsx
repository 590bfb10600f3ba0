import { useQuery } from '@tanstack/react-query'
import { formatMonth } from '../lib/format-time.ts'
import { mayListStations, monthsQuery, stationsQuery } from '../lib/reference-queries.ts'
import { useRole } from '../lib/session.ts'
import { SelectFilter } from './filters.tsx'

type FilterProps = { value: string; onChange: (value: string) => void }

/** Narrows a list to one station; not shown to those who have no list of stations. */
export function StationFilter({ value, onChange }: FilterProps) {
  const isOpen = mayListStations(useRole())
  const stations = useQuery({ ...stationsQuery(), enabled: isOpen })
  if (!isOpen) return null
  return (
    <SelectFilter
      label="Station"
      allLabel="All stations"
      value={value}
      onChange={onChange}
      choices={(stations.data?.items ?? []).map((station) => ({ value: station.id, label: station.name }))}
    />
  )
}

/** Narrows a list to one of the months in which something is held. */
export function MonthFilter({ value, onChange }: FilterProps) {
  const months = useQuery(monthsQuery())
  const held = (months.data?.items ?? []).map(({ month }): string => month)
  // A month from a link stays choosable although nothing is held in it.
  const shown = value === '' || held.includes(value) ? held : [value, ...held]
  return (
    <SelectFilter
      label="Month"
      allLabel="All months"
      value={value}
      onChange={onChange}
      choices={shown.map((month) => ({ value: month, label: formatMonth(month) }))}
    />
  )
}
