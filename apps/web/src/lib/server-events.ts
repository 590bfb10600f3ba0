import { getSession, serverEventSchema, streamEvents, type ServerEvent } from '@fieldfare/contracts'
import { useQueryClient, type QueryClient } from '@tanstack/react-query'
import { useEffect, useEffectEvent } from 'react'
import { callApi } from './api-client.ts'
import { isApiProblem } from './api-problem.ts'

export type ServerEventHandler = (event: ServerEvent, queryClient: QueryClient) => void

const FIRST_PAUSE_MS = 1_000
const LONGEST_PAUSE_MS = 30_000

const handlers = new Set<(event: ServerEvent) => void>()
let source: EventSource | null = null
let pauseTimer: ReturnType<typeof setTimeout> | undefined
let failures = 0

/** The pause before connection attempt number n, doubling up to half a minute. */
export function reconnectPauseMs(failureCount: number): number {
  return Math.min(LONGEST_PAUSE_MS, FIRST_PAUSE_MS * 2 ** Math.max(0, failureCount - 1))
}

/** Reads one message; what this page does not know (a newer server, say) is left alone. */
export function readServerEvent(data: string): ServerEvent | null {
  try {
    const reading = serverEventSchema.safeParse(JSON.parse(data))
    return reading.success ? reading.data : null
  } catch {
    // A line that is not JSON is no event; the stream itself goes on.
    return null
  }
}

function dispatch(message: MessageEvent<unknown>): void {
  const event = typeof message.data === 'string' ? readServerEvent(message.data) : null
  if (event === null) return
  for (const handle of handlers) handle(event)
}

function connect(): void {
  const opened = new EventSource(streamEvents.path)
  source = opened
  opened.addEventListener('open', () => {
    failures = 0
  })
  opened.addEventListener('message', dispatch)
  for (const option of serverEventSchema.options) opened.addEventListener(option.shape.kind.value, dispatch)
  opened.addEventListener('error', () => {
    // A dropped line is retried by the browser itself; a refused one (401, 503) is closed for good.
    if (opened.readyState !== EventSource.CLOSED) return
    failures += 1
    pauseTimer = setTimeout(() => void reconnect(), reconnectPauseMs(failures))
  })
}

async function reconnect(): Promise<void> {
  try {
    await callApi(getSession)
  } catch (error) {
    // Signed out: the sign-in page takes over. Unreachable: the next attempt finds out.
    if (isApiProblem(error) && error.problem.status === 401) return
  }
  if (handlers.size > 0) connect()
}

function disconnect(): void {
  clearTimeout(pauseTimer)
  source?.close()
  source = null
  failures = 0
}

/** Listens to the one event stream of this page; it is open while anybody listens. */
function subscribe(handle: (event: ServerEvent) => void): () => void {
  handlers.add(handle)
  if (handlers.size === 1) connect()
  return () => {
    handlers.delete(handle)
    if (handlers.size === 0) disconnect()
  }
}

/** Calls back for every event of the kinds a page cares about; update or invalidate queries there. */
export function useServerEvents(handler: ServerEventHandler): void {
  const queryClient = useQueryClient()
  const handle = useEffectEvent((event: ServerEvent) => handler(event, queryClient))
  useEffect(() => subscribe((event) => handle(event)), [])
}
