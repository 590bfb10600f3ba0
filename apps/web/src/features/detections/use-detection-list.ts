import { useListSearch } from '../../lib/list-search.ts'

/** The list's criteria in the address; a detection opened from a list carries them on, to know its neighbours. */
export function useDetectionListSearch() {
  return useListSearch({
    filters: ['search', 'stationId', 'recordingId', 'logId', 'month', 'day', 'state'],
    sort: '-startedAt',
  })
}
