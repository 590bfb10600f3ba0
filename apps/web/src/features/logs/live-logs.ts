import type { ServerEvent, StationLogView } from '@fieldfare/contracts'
import type { QueryClient } from '@tanstack/react-query'
import { queryRoots } from '../../lib/query-roots.ts'
import { useServerEvents } from '../../lib/server-events.ts'
import { logListsKey, logQuery, type LogList } from './logs-queries.ts'

type LogProgressEvent = Extract<ServerEvent, { kind: 'log-progress' }>

function isUnderWay(status: StationLogView['status']): boolean {
  return status === 'queued' || status === 'analysing'
}

function withProgress(log: StationLogView, event: LogProgressEvent): StationLogView {
  return log.id === event.logId ? { ...log, status: event.status, progress: event.progress } : log
}

/** Puts a worker's message into what is shown; what the message does not carry is fetched once work has ended. */
export function applyLogProgress(queryClient: QueryClient, event: LogProgressEvent): void {
  if (!isUnderWay(event.status)) {
    void queryClient.invalidateQueries({ queryKey: queryRoots.logs })
    void queryClient.invalidateQueries({ queryKey: ['detections', 'of-log'] })
    return
  }
  queryClient.setQueriesData<LogList>({ queryKey: logListsKey }, (list) =>
    list === undefined ? undefined : { ...list, items: list.items.map((log) => withProgress(log, event)) },
  )
  queryClient.setQueryData(logQuery(event.logId).queryKey, (detail) =>
    detail === undefined ? undefined : { ...detail, log: withProgress(detail.log, event) },
  )
}

/** Keeps logs on this page up to date while workers analyse them. */
export function useLiveLogs(): void {
  useServerEvents((event, queryClient) => {
    if (event.kind === 'log-progress') applyLogProgress(queryClient, event)
  })
}
