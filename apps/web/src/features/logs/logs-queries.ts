import { getLog, listDetections, listLogs, type EndpointOutput } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi, type CallOptions } from '../../lib/api-client.ts'

export type LogList = EndpointOutput<typeof listLogs>
export type LogDetail = EndpointOutput<typeof getLog>

export const logListsKey = ['logs', 'list'] as const

export function logsQuery(query: NonNullable<CallOptions<typeof listLogs>['query']>) {
  return queryOptions({
    queryKey: [...logListsKey, query],
    queryFn: ({ signal }) => callApi(listLogs, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function logQuery(logId: string) {
  return queryOptions({
    queryKey: ['logs', 'one', logId],
    queryFn: ({ signal }) => callApi(getLog, { params: { logId }, signal }),
    staleTime: 10_000,
  })
}

/** What was found in one log; listed under detections, so that a review elsewhere refreshes it. */
export function detectionsOfLogQuery(query: NonNullable<CallOptions<typeof listDetections>['query']>) {
  return queryOptions({
    queryKey: ['detections', 'of-log', query],
    queryFn: ({ signal }) => callApi(listDetections, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}
