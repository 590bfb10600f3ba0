import { getDispute, listDisputes } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'
import type { ListSearch } from '../../lib/list-search.ts'

export function disputesQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['disputes', 'list', query],
    queryFn: ({ signal }) => callApi(listDisputes, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function disputeQuery(disputeId: string) {
  return queryOptions({
    queryKey: ['disputes', 'one', disputeId],
    queryFn: ({ signal }) => callApi(getDispute, { params: { disputeId }, signal }),
    staleTime: 5_000,
  })
}
