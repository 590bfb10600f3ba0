import { listPlays } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi, type CallOptions } from '../../lib/api-client.ts'

export function playsQuery(query: NonNullable<CallOptions<typeof listPlays>['query']>) {
  return queryOptions({
    queryKey: ['plays', 'list', query],
    queryFn: ({ signal }) => callApi(listPlays, { query, signal }),
    staleTime: 30_000,
    placeholderData: keepPreviousData,
  })
}
