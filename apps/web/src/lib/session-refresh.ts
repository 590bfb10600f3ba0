import { refreshSession } from '@fieldfare/contracts'
import { connectionProblem, problemFromAnswer } from './api-problem.ts'
import { csrfHeader } from './csrf.ts'

let running: Promise<boolean> | null = null
const endListeners = new Set<() => void>()

/** A service that is away or not ready has not ended the session: that is a problem to retry, not a sign-out. */
async function exchangeCookies(): Promise<boolean> {
  const answer = await fetch(refreshSession.path, {
    method: refreshSession.method,
    headers: csrfHeader(),
    credentials: 'same-origin',
  }).catch(() => {
    throw connectionProblem()
  })
  if (answer.status >= 500) throw problemFromAnswer(answer.status, undefined)
  return answer.ok
}

/**
 * Refresh cookies rotate, and an old one used twice ends the session: requests of this tab share one
 * exchange, and a lock keeps tabs from exchanging at the same moment.
 */
export function refreshOnce(): Promise<boolean> {
  running ??= exchangeInTurn().finally(() => {
    running = null
  })
  return running
}

function exchangeInTurn(): Promise<boolean> {
  // Browsers offer locks on secure origins only; elsewhere tabs take the small risk of meeting.
  if (!('locks' in navigator)) return exchangeCookies()
  return navigator.locks.request('fieldfare-session-refresh', exchangeCookies)
}

/** Calls back when the session has ended and could not be renewed. Returns the way to stop listening. */
export function onSessionEnd(listener: () => void): () => void {
  endListeners.add(listener)
  return () => {
    endListeners.delete(listener)
  }
}

export function announceSessionEnd(): void {
  for (const listener of endListeners) listener()
}
