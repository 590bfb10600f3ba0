import { exportDetections, reviewStateLabels, reviewStateSchema } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { MonthFilter, StationFilter } from '../../components/airtime-filters.tsx'
import { LinkButton } from '../../components/button.tsx'
import { DataTable } from '../../components/data-table.tsx'
import { DateFilter, FilterBar, SearchFilter, SelectFilter } from '../../components/filters.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { downloadAddress } from '../../lib/endpoint-address.ts'
import { detectionColumns } from './detections-columns.tsx'
import { detectionsQuery } from './detections-queries.ts'
import { useDetectionListSearch } from './use-detection-list.ts'

const stateChoices = reviewStateSchema.options.map((state) => ({
  value: state,
  label: reviewStateLabels[state],
}))

export function DetectionsPage() {
  const search = useDetectionListSearch()
  const detections = useQuery(detectionsQuery(search.query))
  return (
    <>
      <PageHeader
        title="Detections"
        lead="What was found in the station logs, with the evidence for it. A detection is never changed; confirming or rejecting it decides whether its play counts."
      />
      <DetectionFilters search={search} />
      <DataTable
        name="detections"
        caption="Detections"
        captionHidden
        noun="detections"
        columns={detectionColumns}
        query={detections}
        rowId={(detection) => detection.id}
        search={search}
        exportHref={downloadAddress(exportDetections, { query: search.exportQuery })}
        empty={
          <EmptyState
            title="Nothing has been detected yet"
            action={<LinkButton to="/logs">See the station logs</LinkButton>}
          >
            Detections appear here once a station log was analysed and a recording of the catalogue was heard
            in it.
          </EmptyState>
        }
      />
    </>
  )
}

function DetectionFilters({ search }: { search: ReturnType<typeof useDetectionListSearch> }) {
  return (
    <FilterBar search={search}>
      <SearchFilter
        label="Title, artist or ISRC"
        value={search.filters.search}
        onChange={(value) => search.setFilter('search', value)}
      />
      <StationFilter
        value={search.filters.stationId}
        onChange={(value) => search.setFilter('stationId', value)}
      />
      <MonthFilter value={search.filters.month} onChange={(value) => search.setFilter('month', value)} />
      <DateFilter
        kind="date"
        label="Day"
        value={search.filters.day}
        onChange={(value) => search.setFilter('day', value)}
      />
      <SelectFilter
        label="State"
        allLabel="Any state"
        value={search.filters.state}
        onChange={(value) => search.setFilter('state', value)}
        choices={stateChoices}
      />
    </FilterBar>
  )
}
