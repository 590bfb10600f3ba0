import {
  getStatement,
  listStatementLinePlays,
  listStatementLines,
  listStatements,
} from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'
import type { ListSearch } from '../../lib/list-search.ts'

export function statementsQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['statements', 'list', query],
    queryFn: ({ signal }) => callApi(listStatements, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function statementQuery(statementId: string) {
  return queryOptions({
    queryKey: ['statements', 'one', statementId],
    queryFn: ({ signal }) => callApi(getStatement, { params: { statementId }, signal }),
    staleTime: 30_000,
  })
}

export function statementLinesQuery(statementId: string, query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['statements', 'lines', statementId, query],
    queryFn: ({ signal }) => callApi(listStatementLines, { params: { statementId }, query, signal }),
    staleTime: 30_000,
    placeholderData: keepPreviousData,
  })
}

export function statementLinePlaysQuery(statementId: string, lineNumber: string, query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['statements', 'line-plays', statementId, lineNumber, query],
    queryFn: ({ signal }) =>
      callApi(listStatementLinePlays, { params: { statementId, lineNumber }, query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}
