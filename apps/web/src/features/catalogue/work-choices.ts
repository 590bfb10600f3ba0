import { listWorks } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'

/** Works by a part of their title, to choose one from. */
export function workChoicesQuery(search: string) {
  return queryOptions({
    queryKey: ['works', 'choices', search],
    queryFn: ({ signal }) => callApi(listWorks, { query: { search, pageSize: 20, sort: 'title' }, signal }),
    staleTime: 30_000,
    placeholderData: keepPreviousData,
  })
}
