import { getCatalogueImport, listCatalogueImportRows, listCatalogueImports } from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'
import type { ListSearch } from '../../lib/list-search.ts'

export function importsQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['imports', 'list', query],
    queryFn: ({ signal }) => callApi(listCatalogueImports, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

/** A finished import never changes. */
export function importQuery(importId: string) {
  return queryOptions({
    queryKey: ['imports', 'one', importId],
    queryFn: ({ signal }) => callApi(getCatalogueImport, { params: { importId }, signal }),
    staleTime: Infinity,
  })
}

export function importRowsQuery(importId: string, query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['imports', 'rows', importId, query],
    queryFn: ({ signal }) => callApi(listCatalogueImportRows, { params: { importId }, query, signal }),
    staleTime: Infinity,
    placeholderData: keepPreviousData,
  })
}
