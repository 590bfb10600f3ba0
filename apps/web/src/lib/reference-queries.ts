import { listMonths, listStations, type Role } from '@fieldfare/contracts'
import { queryOptions } from '@tanstack/react-query'
import { callApi } from './api-client.ts'

/** The stations in scope, for filters, choices and the list of stations alike. */
export function stationsQuery() {
  return queryOptions({
    queryKey: ['stations', 'list'],
    queryFn: ({ signal }) => callApi(listStations, { signal }),
    staleTime: 60_000,
  })
}

/** The months in which something is held, and the one the desk works on now. */
export function monthsQuery() {
  return queryOptions({
    queryKey: ['months'],
    queryFn: ({ signal }) => callApi(listMonths, { signal }),
    staleTime: 60_000,
  })
}

/** Whether a role may ask for the list of stations; the contract says who. */
export function mayListStations(role: Role): boolean {
  return listStations.access.some((reader) => reader === role)
}
