import { getDistribution, listDistributions, type MonthStatus } from '@fieldfare/contracts'
import { queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'

export function distributionsQuery() {
  return queryOptions({
    queryKey: ['distributions', 'list'],
    queryFn: ({ signal }) => callApi(listDistributions, { signal }),
    staleTime: 5_000,
  })
}

function isInWork(status: MonthStatus | undefined): boolean {
  return status === 'calculating' || status === 'issuing'
}

/** Progress comes live; asking again every two seconds while a worker is at it covers a lost event stream. */
export function distributionQuery(month: string) {
  return queryOptions({
    queryKey: ['distributions', 'one', month],
    queryFn: ({ signal }) => callApi(getDistribution, { params: { month }, signal }),
    staleTime: 5_000,
    refetchInterval: ({ state }) => (isInWork(state.data?.status) ? 2_000 : false),
  })
}
