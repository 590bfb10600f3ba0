import { getSystemHealth, getUser, listAuditEvents, listInbox, listUsers } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'
import type { ListSearch } from '../../lib/list-search.ts'

export function usersQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['administration', 'users', query],
    queryFn: ({ signal }) => callApi(listUsers, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function userQuery(userId: string) {
  return queryOptions({
    queryKey: ['administration', 'user', userId],
    queryFn: ({ signal }) => callApi(getUser, { params: { userId }, signal }),
    staleTime: 10_000,
  })
}

export function inboxQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['administration', 'inbox', query],
    queryFn: ({ signal }) => callApi(listInbox, { query, signal }),
    staleTime: 0,
    refetchInterval: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function systemQuery() {
  return queryOptions({
    queryKey: ['administration', 'system'],
    queryFn: ({ signal }) => callApi(getSystemHealth, { signal }),
    staleTime: 0,
    refetchInterval: 5_000,
  })
}

export function auditEventsQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['administration', 'audit-events', query],
    queryFn: ({ signal }) => callApi(listAuditEvents, { query, signal }),
    staleTime: 5_000,
    placeholderData: keepPreviousData,
  })
}
