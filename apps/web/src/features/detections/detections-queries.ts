import { getDetection, listDetections } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi, type CallOptions } from '../../lib/api-client.ts'

export function detectionsQuery(query: NonNullable<CallOptions<typeof listDetections>['query']>) {
  return queryOptions({
    queryKey: ['detections', 'list', query],
    queryFn: ({ signal }) => callApi(listDetections, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function detectionQuery(detectionId: string) {
  return queryOptions({
    queryKey: ['detections', 'one', detectionId],
    queryFn: ({ signal }) => callApi(getDetection, { params: { detectionId }, signal }),
    staleTime: 10_000,
  })
}
