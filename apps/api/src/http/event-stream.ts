import type { Request, Response } from 'express'

/** One viewer's open stream of Server-Sent Events. */
export type EventStream = {
  /** Sends one event as JSON. False when the viewer reads too slowly; the event was left out then. */
  send: (event: unknown) => boolean
  close: () => void
  /** Runs when the stream ends, whoever ended it. */
  onClose: (listener: () => void) => void
}

const HEARTBEAT_MS = 15_000
/** A viewer with this much unread has stalled: it loses progress messages, which the next ones replace anyway. */
const UNREAD_LIMIT_BYTES = 256 * 1024

/**
 * Turns the answer into an event stream. A comment each 15 s keeps proxies from closing it and finds out about
 * viewers who have gone.
 */
export function openEventStream(request: Request, response: Response): EventStream {
  const listeners: (() => void)[] = []
  response.status(200)
  response.setHeader('content-type', 'text/event-stream; charset=utf-8')
  response.setHeader('cache-control', 'no-store')
  response.setHeader('x-accel-buffering', 'no')
  response.flushHeaders()
  response.write('retry: 3000\n\n')
  const heartbeat = setInterval(() => {
    if (response.writableLength < UNREAD_LIMIT_BYTES) response.write(': still here\n\n')
  }, HEARTBEAT_MS)

  let isOpen = true
  function finish(): void {
    if (!isOpen) return
    isOpen = false
    clearInterval(heartbeat)
    for (const listener of listeners) listener()
  }
  response.on('close', finish)
  response.on('error', finish)
  request.on('aborted', finish)

  return {
    send(event) {
      if (!isOpen || response.writableLength >= UNREAD_LIMIT_BYTES) return false
      response.write(`data: ${JSON.stringify(event)}\n\n`)
      return true
    },
    close() {
      finish()
      response.end()
    },
    onClose: (listener) => listeners.push(listener),
  }
}
