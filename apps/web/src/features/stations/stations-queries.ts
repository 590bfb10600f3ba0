import { getMonthOverview, getStation, getStationDay, getStationMonth, listLogs } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'

export function stationQuery(stationId: string) {
  return queryOptions({
    queryKey: ['stations', 'one', stationId],
    queryFn: ({ signal }) => callApi(getStation, { params: { stationId }, signal }),
    staleTime: 60_000,
  })
}

export function stationMonthQuery(stationId: string, month: string) {
  return queryOptions({
    queryKey: ['stations', 'month', stationId, month],
    queryFn: ({ signal }) => callApi(getStationMonth, { params: { stationId, month }, signal }),
    staleTime: 30_000,
    placeholderData: keepPreviousData,
  })
}

export function stationDayQuery(stationId: string, day: string) {
  return queryOptions({
    queryKey: ['stations', 'day', stationId, day],
    queryFn: ({ signal }) => callApi(getStationDay, { params: { stationId, day }, signal }),
    staleTime: 30_000,
  })
}

/** The log of a station that reaches furthest. */
export function lastLogQuery(stationId: string) {
  return queryOptions({
    queryKey: ['logs', 'last', stationId],
    queryFn: ({ signal }) =>
      callApi(listLogs, { query: { stationId, pageSize: 1, sort: '-startedAt' }, signal }),
    staleTime: 30_000,
  })
}

/** The stations' figures of a month, for the list of stations. */
export function stationFiguresQuery(month: string) {
  return queryOptions({
    queryKey: ['overview', month],
    queryFn: ({ signal }) => callApi(getMonthOverview, { params: { month }, signal }),
    staleTime: 30_000,
  })
}
