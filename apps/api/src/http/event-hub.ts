import type { ServerEvent, SessionId } from '@fieldfare/contracts'
import {
  findSessionActor,
  scopeOf,
  subscribeToProgress,
  type Database,
  type ProgressSubscription,
  type Scope,
} from '@fieldfare/database'
import type { Redis } from 'ioredis'
import type { Logger } from 'pino'
import type { EventStream } from './event-stream.ts'

/** Whether an event may reach somebody with this scope. */
export type EventFilter = (event: ServerEvent, scope: Scope) => boolean

/** Hands the progress that workers publish to everybody who watches, each only what is in their scope. */
export type EventHub = {
  start: () => Promise<void>
  /** Adds a viewer until their stream or their session ends. */
  attach: (viewer: {
    stream: EventStream
    sessionId: SessionId
    scope: Scope
    isVisible: EventFilter
  }) => void
  /** Closes the streams of sessions that have ended, at once. */
  closeSessions: (sessionIds: readonly SessionId[]) => void
  stop: () => Promise<void>
}

type Viewer = { stream: EventStream; sessionId: SessionId; scope: Scope; isVisible: EventFilter }

export type EventHubOptions = {
  database: Database
  redis: Redis
  logger: Logger
  /** How often sessions of open streams are looked at, for those that expired or were ended by another process. */
  sessionCheckMs?: number
}

export function createEventHub(options: EventHubOptions): EventHub {
  const { database, redis, logger, sessionCheckMs = 5000 } = options
  const viewers = new Set<Viewer>()
  let subscription: ProgressSubscription | null = null
  let timer: NodeJS.Timeout | null = null

  function deliver(event: ServerEvent): void {
    for (const viewer of viewers) {
      if (viewer.isVisible(event, viewer.scope)) viewer.stream.send(event)
    }
  }

  function closeWhere(isOver: (viewer: Viewer) => boolean): void {
    for (const viewer of [...viewers].filter(isOver)) viewer.stream.close()
  }

  async function checkSessions(): Promise<void> {
    for (const sessionId of new Set([...viewers].map((viewer) => viewer.sessionId))) {
      const actor = await findSessionActor(database, sessionId)
      if (actor === null) closeWhere((viewer) => viewer.sessionId === sessionId)
      else {
        // Scopes may have been widened or narrowed without the session ending.
        for (const viewer of viewers) if (viewer.sessionId === sessionId) viewer.scope = scopeOf(actor)
      }
    }
  }

  function scheduleCheck(): void {
    timer = setTimeout(() => {
      checkSessions()
        .catch((error: unknown) =>
          logger.error({ err: error }, 'sessions of open streams could not be checked'),
        )
        .finally(() => {
          if (timer !== null) scheduleCheck()
        })
    }, sessionCheckMs)
  }

  return {
    async start() {
      subscription = await subscribeToProgress(redis, deliver)
      scheduleCheck()
    },
    attach(viewer) {
      const entry = { ...viewer }
      viewers.add(entry)
      viewer.stream.onClose(() => viewers.delete(entry))
    },
    closeSessions: (sessionIds) => closeWhere((viewer) => sessionIds.includes(viewer.sessionId)),
    async stop() {
      if (timer !== null) clearTimeout(timer)
      timer = null
      closeWhere(() => true)
      await subscription?.close()
    },
  }
}
