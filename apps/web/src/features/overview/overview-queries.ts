import { getMonthOverview } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'

export function overviewQuery(month: string) {
  return queryOptions({
    queryKey: ['overview', month],
    queryFn: ({ signal }) => callApi(getMonthOverview, { params: { month }, signal }),
    staleTime: 30_000,
    placeholderData: keepPreviousData,
  })
}
