import { createStation, getMonthOverview } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { Plus } from 'lucide-react'
import { useMemo } from 'react'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { formatMonth } from '../../lib/format-time.ts'
import { monthsQuery, stationsQuery } from '../../lib/reference-queries.ts'
import { useRole } from '../../lib/session.ts'
import { stationColumns, stationColumnsWithMonth, type StationRow } from './stations-columns.tsx'
import { stationFiguresQuery } from './stations-queries.ts'

export function StationsPage() {
  const role = useRole()
  const mayAdd = createStation.access.some((allowed) => allowed === role)
  const maySeeAirtime = getMonthOverview.access.some((reader) => reader === role)
  const stations = useQuery(stationsQuery())
  const months = useQuery({ ...monthsQuery(), enabled: maySeeAirtime })
  const month = months.data?.current
  const figures = useQuery({ ...stationFiguresQuery(month ?? ''), enabled: month !== undefined })
  const items = useMemo(
    () =>
      stations.data?.items.map((station): StationRow => ({
        station,
        figures: figures.data?.stations.find((row) => row.station.id === station.id) ?? null,
        month: month ?? null,
      })),
    [stations.data, figures.data, month],
  )
  const add = (
    <LinkButton to="/stations/new" tone="main" icon={Plus}>
      Add a station
    </LinkButton>
  )
  return (
    <>
      <PageHeader
        title="Stations"
        lead={
          month === undefined
            ? 'The stations the society licenses, with the licence in force today.'
            : `The licence in force today, and what was found in ${formatMonth(month)}.`
        }
        actions={mayAdd && add}
      />
      <DataTable
        name={maySeeAirtime ? 'stations' : 'stations-licences'}
        caption="Stations"
        captionHidden
        noun="stations"
        columns={maySeeAirtime ? stationColumnsWithMonth : stationColumns}
        query={{
          data: items === undefined ? undefined : { items },
          error: stations.error,
          isFetching: stations.isFetching,
          refetch: stations.refetch,
        }}
        rowId={({ station }) => station.id}
        empty={
          <EmptyState title="No stations here yet" action={mayAdd && add}>
            {mayAdd
              ? 'Add the stations the society licenses; their logs can be sent as soon as they are here.'
              : 'An administrator adds stations and assigns them to people.'}
          </EmptyState>
        }
      />
    </>
  )
}
