import { listSessions } from '@fieldfare/contracts'
import { queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'

export function sessionsQuery() {
  return queryOptions({
    queryKey: ['account', 'sessions'],
    queryFn: ({ signal }) => callApi(listSessions, { signal }),
    staleTime: 0,
  })
}
