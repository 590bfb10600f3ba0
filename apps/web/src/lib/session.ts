import { getSession, type Role, type SessionView } from '@fieldfare/contracts'
import { queryOptions, useSuspenseQuery } from '@tanstack/react-query'
import { callApi } from './api-client.ts'

export function sessionQuery() {
  return queryOptions({
    queryKey: ['session'],
    queryFn: ({ signal }) => callApi(getSession, { signal }),
    staleTime: 5 * 60_000,
  })
}

/** Who is signed in. Usable on every page inside the shell, where the session is loaded before anything is drawn. */
export function useSession(): SessionView {
  return useSuspenseQuery(sessionQuery()).data
}

export function useRole(): Role {
  return useSession().user.role
}
